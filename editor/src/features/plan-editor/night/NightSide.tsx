import { Ledger } from '../ledger/Ledger';
import { useEditor, useSession } from '../page/context';
import type { Side } from '../store/session';
import { LightPanel } from './LightPanel';
import styles from './night-side.module.css';

const sides: readonly { readonly id: Side; readonly word: string }[] = [
  { id: 'light', word: 'Light' },
  { id: 'ledger', word: 'Ledger' },
];

/** Beside the drawing at night: its light, or the ledger as by day. */
export function NightSide({ jobName }: { readonly jobName: string }) {
  const editor = useEditor();
  const side = useSession((s) => s.side);
  return (
    <div className={styles.side}>
      <fieldset className={styles.sides} aria-label="Beside the drawing">
        {sides.map(({ id, word }) => (
          <button
            key={id}
            type="button"
            aria-pressed={side === id}
            onClick={() => editor.session.setState({ side: id })}
          >
            {word}
          </button>
        ))}
      </fieldset>
      {side === 'ledger' ? <Ledger /> : <LightPanel jobName={jobName} />}
    </div>
  );
}
