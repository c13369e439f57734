import type { DoneImport, ImportRow } from './api';

type Summary = DoneImport['summary'];

export const rowsText = (count: number): string => (count === 1 ? '1 row' : `${count} rows`);

/** "3 new, 1 changed, 2 not taken": what an import did. */
export const summaryText = ({ added, changed, faults }: Summary): string =>
  [
    added > 0 && `${added} new`,
    changed > 0 && `${changed} changed`,
    faults > 0 && `${rowsText(faults)} not taken`,
  ]
    .filter(Boolean)
    .join(', ');

/** The same as a sentence, for whoever has just taken it in. */
export function takenText({ added, changed }: Summary): string {
  const items = added + changed === 1 ? 'item is' : 'items are';
  const parts = [added > 0 && `${added} new`, changed > 0 && `${changed} changed`].filter(Boolean);
  return `${parts.join(' and ')} ${items} in the catalogue.`;
}

export const undoneText = (fileName: string, kept: readonly string[]): string =>
  kept.length === 0
    ? `${fileName} is taken back.`
    : `${fileName} is taken back. Changed since, and left as they are: ${keptText(kept)}.`;

/** A message has room for a few names. */
function keptText(kept: readonly string[]): string {
  const [most, rest] = [kept.slice(0, 3).join('; '), kept.length - 3];
  return rest > 0 ? `${most}; and ${rest} more` : most;
}

export function actionLabel(action: ImportRow['action']): string {
  switch (action) {
    case 'add':
      return 'New';
    case 'change':
      return 'Changed';
    case 'same':
      return 'As it is';
    case 'fault':
      return 'Can’t be taken';
    case 'left-out':
      return 'Left out';
  }
}
