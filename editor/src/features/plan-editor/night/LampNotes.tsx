import { count } from '../../../lib/format';
import { useNight } from './context';
import styles from './light-panel.module.css';
import { Part } from './Part';
import { List, Rows } from './Rows';

/** What to know of the lamps in the picture: too many volts or too few, none at all, and what was assumed. */
export function LampNotes() {
  const notes = useNight((s) => s.notes);
  const assumed = notes.filter(({ kind }) => kind === 'assumed');
  const told = notes.filter(({ kind }) => kind !== 'assumed');
  if (notes.length === 0) return null;
  return (
    <Part title="Lamps">
      {told.length > 0 && <Rows rows={told} />}
      {assumed.length > 0 && (
        <details className={styles.more}>
          <summary>{count(assumed.length, 'thing')} taken as usual</summary>
          <List rows={assumed} />
        </details>
      )}
    </Part>
  );
}
