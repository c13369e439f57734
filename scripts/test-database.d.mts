export function ensureTestDatabase(): Promise<string>;
