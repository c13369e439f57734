/** Somebody came back from the card service's page. What that page said is not believed: it only says so. */
export interface Returned {
  /** The due it was for, where the address names it. */
  readonly dueId: string | null;
}

export function returnedOf(search: string, dueIds: readonly string[]): Returned | null {
  const paid = new URLSearchParams(search).get('paid');
  if (paid === null) return null;
  return { dueId: dueIds.includes(paid) ? paid : null };
}
