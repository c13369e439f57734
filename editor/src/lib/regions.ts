/** Regional packs a company can work by. Words, volts and rules follow the pack. */
export const regions = [
  { value: 'us', label: 'United States · 120 V, NEC' },
  { value: 'eu', label: 'Europe · 230 V, IEC 60364-7-715' },
  { value: 'uk', label: 'United Kingdom · 230 V, IEC 60364-7-715' },
] as const;

export type Region = (typeof regions)[number]['value'];
