import type { RevisionDetail, RevisionDocument } from './api';

export type Combination = RevisionDocument['price']['combinations'][number];

const same = (a: readonly string[], b: readonly string[]) =>
  a.length === b.length && a.every((id) => b.includes(id));

/** The sums that count: of the groups that were approved, or else of what is offered. */
export function combinationOf({ document, revision }: RevisionDetail): Combination | undefined {
  const { combinations } = document.price;
  const approved = revision.approval;
  return (
    (approved === null ? undefined : combinations.find(({ groups }) => same(groups, approved.groups))) ??
    combinations[0]
  );
}

/** Names of groups by their ids; one that has no name any more keeps its id. */
export const groupNames = (document: RevisionDocument, ids: readonly string[]): readonly string[] =>
  ids.map((id) => document.price.groups.find((group) => group.id === id)?.name ?? id);

/** "+$120.00", "−$40.00", "no difference". */
export const signed = (byMinor: number, money: (minor: number) => string): string =>
  byMinor === 0 ? 'no difference' : byMinor > 0 ? `+${money(byMinor)}` : money(byMinor);

/** "when approved", for a stage of payment. */
export function dueWord(due: 'approval' | 'start' | 'finish'): string {
  switch (due) {
    case 'approval':
      return 'when approved';
    case 'start':
      return 'when work begins';
    case 'finish':
      return 'when finished';
  }
}
