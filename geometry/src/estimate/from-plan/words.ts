/** Volts for the eye: one decimal, a second only where the first would lie about the limit (9.96 against 10). */
export function voltsInWords(volts: number, limit: number): string {
  const honest = Math.sign(volts - limit) === Math.sign(Number(volts.toFixed(1)) - limit);
  return `${volts.toFixed(honest ? 1 : 2)} V`;
}

/** A label at the head of a sentence. */
export function capitalised(label: string): string {
  return label.charAt(0).toUpperCase() + label.slice(1);
}

/** `run 1`, `run 1 and run 2`, `run 1, run 2 and run 3`. */
export function listed(labels: readonly string[]): string {
  if (labels.length < 2) return labels[0] ?? '';
  return `${labels.slice(0, -1).join(', ')} and ${labels.at(-1)}`;
}
