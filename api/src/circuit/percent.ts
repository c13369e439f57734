/** Percents are for people; a limit of next to nothing must not turn into Infinity, which JSON cannot hold. */
export function percentOf(part: number, whole: number): number {
  return Math.min(Number.MAX_VALUE, (part / whole) * 100);
}
