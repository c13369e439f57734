/** A number that somebody typed, with either decimal sign; null for what is no number. */
export function readNumber(text: string): number | null {
  const bare = text.trim().replace(/\s*%$/, '').replace(',', '.');
  return /^(\d+\.?\d*|\.\d+)$/.test(bare) ? Number(bare) : null;
}

/** A percentage with at most four decimals, as every percentage is kept; null for anything else. */
export function readPercent(text: string, most: number): number | null {
  const n = readNumber(text);
  if (n === null || n > most || Math.abs(n * 10_000 - Math.round(n * 10_000)) > 1e-6) return null;
  return n;
}

export function readWhole(text: string, most: number): number | null {
  const n = readNumber(text);
  return n === null || !Number.isInteger(n) || n > most ? null : n;
}
