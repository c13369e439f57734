/** One thing wrong with a request: where (an RFC 6901 pointer into it) and what, in a sentence. */
export interface Fault {
  readonly pointer: string;
  readonly detail: string;
}

/** How many faults are listed one by one; a last entry then says how many more there are. */
export const LISTED_FAULTS = 500;

/** Quoted values are cut here, so that a hostile text cannot make an answer of megabytes. */
const QUOTED_CHARACTERS = 60;

/** An RFC 6901 JSON pointer; the empty path is the whole document. */
export function pointerOf(path: readonly PropertyKey[]): string {
  let pointer = '';
  for (const part of path) {
    pointer += `/${String(part).replaceAll('~', '~0').replaceAll('/', '~1')}`;
  }
  return pointer;
}

/** What came, as a sentence may quote it. */
export function shown(value: unknown): string {
  if (typeof value === 'string') {
    return JSON.stringify(value.length > QUOTED_CHARACTERS ? `${value.slice(0, QUOTED_CHARACTERS)}…` : value);
  }
  if (value === undefined) return 'nothing';
  if (value === null) return 'null';
  if (Array.isArray(value)) return 'a list';
  if (typeof value === 'object') return 'an object';
  if (typeof value === 'function' || typeof value === 'symbol') return `a ${typeof value}`;
  return String(value);
}

/** Collects faults up to LISTED_FAULTS and counts the rest. */
export class FaultList {
  private readonly faults: Fault[] = [];
  private unlisted = 0;

  get isEmpty(): boolean {
    return this.faults.length === 0;
  }

  add(path: readonly PropertyKey[], detail: string): void {
    if (this.faults.length < LISTED_FAULTS) this.faults.push({ pointer: pointerOf(path), detail });
    else this.unlisted += 1;
  }

  /** The faults, and where some were left out a last entry with their number. */
  listed(): Fault[] {
    if (this.unlisted === 0) return [...this.faults];
    const more = this.unlisted === 1 ? 'There is 1 more fault' : `There are ${this.unlisted} more faults`;
    return [...this.faults, { pointer: '', detail: `${more} than the ${LISTED_FAULTS} listed here.` }];
  }
}
