/** Regional packs a company can work by. Words, volts and rules follow the pack. */
export const regionCodes = ['us', 'eu', 'uk'] as const;
export type Region = (typeof regionCodes)[number];

function label(region: Region): string {
  switch (region) {
    case 'us':
      return 'United States · 120 V, NEC';
    case 'eu':
      return 'Europe · 230 V, IEC 60364-7-715';
    case 'uk':
      return 'United Kingdom · 230 V, IEC 60364-7-715';
  }
}

export const regions = regionCodes.map((value) => ({ value, label: label(value) }));
