import type { NightNote } from '@lampwright/geometry/light';
import { count } from '../../../lib/format';
import { useEditor } from '../page/context';
import { useNight } from './context';
import styles from './light-panel.module.css';
import { Part } from './Part';

/** What to know of the lamps in the picture: too many volts or too few, none at all, and what was assumed. */
export function LampNotes() {
  const notes = useNight((s) => s.notes);
  const assumed = notes.filter(({ kind }) => kind === 'assumed');
  const told = notes.filter(({ kind }) => kind !== 'assumed');
  if (notes.length === 0) return null;
  return (
    <Part title="About these lamps">
      {told.length > 0 && <List notes={told} />}
      {assumed.length > 0 && (
        <details className={styles.more}>
          <summary>{count(assumed.length, 'thing')} taken as usual</summary>
          <List notes={assumed} />
        </details>
      )}
    </Part>
  );
}

function List({ notes }: { readonly notes: readonly NightNote[] }) {
  const editor = useEditor();
  return (
    <ul className={styles.notes}>
      {notes.map(({ recordId, text }) => (
        <li key={`${recordId} ${text}`}>
          <span>{text}</span>
          <button type="button" onClick={() => editor.reveal(recordId)}>
            Show<span className="visually-hidden">: {text}</span>
          </button>
        </li>
      ))}
    </ul>
  );
}
