import { useEffect, useState } from 'react';
import { Button } from '../../components/button';
import { Table as TableFrame } from '../../components/table';
import type { ImportRow, Preview as PreviewAnswer } from './api';
import styles from './import.module.css';
import { actionLabel } from './words';

type Action = ImportRow['action'];
type Shown = 'all' | Action;
const PAGE = 100;

interface PreviewProps {
  readonly preview: PreviewAnswer;
  /** A newer one is on its way. */
  readonly busy: boolean;
  readonly columns: readonly string[];
  readonly leftOut: ReadonlySet<number>;
  readonly onLeaveOut: (row: number, out: boolean) => void;
}

/** The third step: what each row would do. */
export function Preview({ preview, busy, columns, leftOut, onLeaveOut }: PreviewProps) {
  const [chosen, setShown] = useState<Shown>('all');
  const [most, setMost] = useState(PAGE);
  const taken = useTakenActions(preview);
  const counts: Readonly<Record<Shown, number>> = {
    all: preview.rows.length,
    add: preview.added,
    change: preview.changed,
    fault: preview.faults,
    same: preview.same,
    'left-out': preview.leftOut,
  };
  // What is said of a row may have changed, with none of its kind left.
  const shown = counts[chosen] > 0 || [...leftOut].some((row) => taken.get(row) === chosen) ? chosen : 'all';
  const rows = preview.rows.filter(
    ({ row, action }) =>
      shown === 'all' ||
      action === shown ||
      // One that is left out stays where it was unticked, to be ticked again.
      (leftOut.has(row) && taken.get(row) === shown),
  );
  const tabs = (['all', 'add', 'change', 'fault', 'same', 'left-out'] as const).filter(
    (value) => counts[value] > 0 || value === shown,
  );
  return (
    <>
      <fieldset className={styles.tabs}>
        <legend className="visually-hidden">Which rows to show</legend>
        {tabs.map((value) => (
          <button
            key={value}
            type="button"
            className={styles.tab}
            aria-pressed={shown === value}
            onClick={() => {
              setShown(value);
              setMost(PAGE);
            }}
          >
            {tabLabel(value)} <span className={styles.count}>{counts[value]}</span>
          </button>
        ))}
      </fieldset>
      <p className="visually-hidden" role="status">
        {tabs
          .slice(1)
          .map((value) => `${tabLabel(value)}: ${counts[value]}`)
          .join(', ')}
      </p>
      <div className={styles.preview} aria-busy={busy}>
        <TableFrame label="Rows of the table">
          <thead>
            <tr>
              <th scope="col" className={styles.number}>
                Row
              </th>
              <th scope="col">Item</th>
              <th scope="col">What happens</th>
              <th scope="col" className={styles.take}>
                Take
              </th>
            </tr>
          </thead>
          <tbody>
            {rows.slice(0, most).map((row) => (
              <Row
                key={row.row}
                row={row}
                action={leftOut.has(row.row) ? 'left-out' : (taken.get(row.row) ?? row.action)}
                columns={columns}
                onLeaveOut={onLeaveOut}
              />
            ))}
          </tbody>
        </TableFrame>
      </div>
      {rows.length > most && (
        <p className={styles.more}>
          <Button onClick={() => setMost(most + PAGE)}>
            Show {Math.min(PAGE, rows.length - most)} more of {rows.length}
          </Button>
        </p>
      )}
    </>
  );
}

interface RowProps {
  readonly row: ImportRow;
  /** As it is at once, while the server is still to be asked. */
  readonly action: Action;
  readonly columns: readonly string[];
  readonly onLeaveOut: (row: number, out: boolean) => void;
}

function Row({ row, action, columns, onLeaveOut }: RowProps) {
  const choosable = action === 'add' || action === 'change' || action === 'left-out';
  const name = row.name || 'No name';
  return (
    <tr data-action={action}>
      <td className={styles.number}>{row.row + 1}</td>
      <th scope="row" className={styles.head}>
        {name}
      </th>
      <td className={styles.what}>
        <span className={styles.action}>{actionLabel(action)}</span>
        {action !== 'left-out' && row.faults.length + row.changes.length > 0 && (
          <ul className={styles.details}>
            {row.faults.map(({ column, detail }) => (
              <li key={`${column} ${detail}`}>
                {sayWhere(detail, column === null ? null : columns[column] || `Column ${column + 1}`)}
              </li>
            ))}
            {row.changes.map(({ field, was, now }) => (
              <li key={field}>
                {field}: {was || 'nothing'} → {now || 'nothing'}
              </li>
            ))}
          </ul>
        )}
      </td>
      <td className={styles.take}>
        {choosable && (
          <input
            type="checkbox"
            className={styles.check}
            aria-label={`Take row ${row.row + 1}, ${name}`}
            checked={action !== 'left-out'}
            onChange={({ target }) => onLeaveOut(row.row, !target.checked)}
          />
        )}
      </td>
    </tr>
  );
}

/** A detail begins with the name of its field; the head of the file's column is said where it is another. */
const sayWhere = (detail: string, head: string | null): string =>
  head === null || detail.toLowerCase().startsWith(`${head.toLowerCase()}:`)
    ? detail
    : `In “${head}” – ${detail}`;

function tabLabel(shown: Shown): string {
  switch (shown) {
    case 'all':
      return 'All';
    case 'same':
      return 'As they are';
    case 'add':
    case 'change':
    case 'fault':
    case 'left-out':
      return actionLabel(shown);
  }
}

/** What rows do when they are taken, remembered for those that are left out. */
function useTakenActions(preview: PreviewAnswer): ReadonlyMap<number, Action> {
  const [known, setKnown] = useState<ReadonlyMap<number, Action>>(() => takenOf(preview, new Map()));
  useEffect(() => setKnown((before) => takenOf(preview, before)), [preview]);
  return known;
}

function takenOf({ rows }: PreviewAnswer, before: ReadonlyMap<number, Action>): ReadonlyMap<number, Action> {
  return new Map(
    rows.flatMap(({ row, action }) => {
      const taken = action === 'left-out' ? before.get(row) : action;
      return taken === undefined ? [] : [[row, taken] as const];
    }),
  );
}
