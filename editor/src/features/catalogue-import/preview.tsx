import { useState } from 'react';
import { Button } from '../../components/button';
import { Table as TableFrame } from '../../components/table';
import type { ImportRow, Preview as PreviewAnswer } from './api';
import styles from './import.module.css';

type Shown = 'all' | ImportRow['action'];
const PAGE = 100;

function actionLabel(action: ImportRow['action']): string {
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

interface PreviewProps {
  readonly preview: PreviewAnswer;
  readonly columns: readonly string[];
  readonly leftOut: ReadonlySet<number>;
  readonly onLeaveOut: (row: number, out: boolean) => void;
}

/** The third step: what each row would do. */
export function Preview({ preview, columns, leftOut, onLeaveOut }: PreviewProps) {
  const [shown, setShown] = useState<Shown>('all');
  const [most, setMost] = useState(PAGE);
  const rows = preview.rows.filter(({ action }) => shown === 'all' || action === shown);
  const tabs: readonly { readonly value: Shown; readonly label: string; readonly count: number }[] = [
    { value: 'all', label: 'All', count: preview.rows.length },
    { value: 'add', label: 'New', count: preview.added },
    { value: 'change', label: 'Changed', count: preview.changed },
    { value: 'fault', label: 'Can’t be taken', count: preview.faults },
    { value: 'same', label: 'As they are', count: preview.same },
  ];
  return (
    <>
      <fieldset className={styles.tabs}>
        <legend className={styles.hidden}>Which rows to show</legend>
        {tabs
          .filter(({ value, count }) => count > 0 || value === 'all')
          .map(({ value, label, count }) => (
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
              {label} <span className={styles.count}>{count}</span>
            </button>
          ))}
      </fieldset>
      <TableFrame label="Rows of the table">
        <thead>
          <tr>
            <th scope="col" className={styles.number}>
              Row
            </th>
            <th scope="col">Item</th>
            <th scope="col">What happens</th>
            <th scope="col" className={styles.number}>
              Take
            </th>
          </tr>
        </thead>
        <tbody>
          {rows.slice(0, most).map((row) => (
            <tr key={row.row} data-action={row.action}>
              <td className={styles.number}>{row.row + 1}</td>
              <th scope="row" className={styles.head}>
                {row.name || 'No name'}
              </th>
              <td>
                <span className={styles.action}>{actionLabel(row.action)}</span>
                <ul className={styles.details}>
                  {row.faults.map(({ column, detail }) => (
                    <li key={`${column} ${detail}`}>
                      {column === null ? '' : `In “${columns[column] ?? ''}” – `}
                      {detail}
                    </li>
                  ))}
                  {row.changes.map(({ field, was, now }) => (
                    <li key={field}>
                      {field}: {was === '' ? 'nothing' : was} → {now === '' ? 'nothing' : now}
                    </li>
                  ))}
                </ul>
              </td>
              <td className={styles.number}>
                {(row.action === 'add' || row.action === 'change' || leftOut.has(row.row)) && (
                  <input
                    type="checkbox"
                    className={styles.check}
                    aria-label={`Take row ${row.row + 1}, ${row.name}`}
                    checked={!leftOut.has(row.row)}
                    onChange={({ target }) => onLeaveOut(row.row, !target.checked)}
                  />
                )}
              </td>
            </tr>
          ))}
        </tbody>
      </TableFrame>
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
