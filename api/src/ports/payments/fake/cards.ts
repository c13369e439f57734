/** The cards of the stand-in's page. Each behaves in one way that a real one may. */
export const testCards = [
  { id: 'works', label: 'A card that works' },
  { id: 'declined', label: 'A card that is declined' },
  { id: 'short', label: 'Too little money at first, then works' },
  { id: 'late', label: 'Works; word of it comes five seconds late' },
  { id: 'twice', label: 'Works; word of it comes twice' },
  { id: 'disorder', label: 'Declined, then works; words come in the wrong order' },
  { id: 'bank-later', label: 'A bank debit: the money comes five seconds later' },
  { id: 'bank-fails', label: 'A bank debit that fails five seconds later' },
] as const;

export type TestCard = (typeof testCards)[number]['id'];

export const testCardOf = (text: string): TestCard | null =>
  testCards.find(({ id }) => id === text)?.id ?? null;
