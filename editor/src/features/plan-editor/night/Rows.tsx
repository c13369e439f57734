import { useEditor } from '../page/context';
import styles from './light-panel.module.css';

export interface TellingRow {
  /** The record that it is about, shown when it is pressed; null: of no one place. */
  readonly recordId: string | null;
  readonly text: string;
}

/** So many are told at once; the rest unfolds. */
const FIRST = 4;

/** Sentences about records; pressing one chooses the record and brings it into sight. */
export function Rows({ rows }: { readonly rows: readonly TellingRow[] }) {
  const rest = rows.slice(FIRST);
  return (
    <>
      <List rows={rows.slice(0, FIRST)} />
      {rest.length > 0 && (
        <details className={styles.more}>
          <summary>{rest.length} more</summary>
          <List rows={rest} />
        </details>
      )}
    </>
  );
}

export function List({ rows }: { readonly rows: readonly TellingRow[] }) {
  const editor = useEditor();
  return (
    <ul className={styles.rows}>
      {rows.map(({ recordId, text }) => (
        <li key={`${recordId} ${text}`}>
          {recordId === null ? (
            text
          ) : (
            <button type="button" title="Show on the drawing" onClick={() => editor.reveal(recordId)}>
              {text}
            </button>
          )}
        </li>
      ))}
    </ul>
  );
}
