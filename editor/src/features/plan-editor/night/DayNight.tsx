import { useEditor, useSession } from '../page/context';
import type { Mode } from '../store/session';
import styles from './day-night.module.css';
import { setMode } from './set-mode';

const modes: readonly { readonly id: Mode; readonly word: string; readonly title: string }[] = [
  { id: 'day', word: 'Day', title: 'The sheet as drawn (L)' },
  { id: 'night', word: 'Night', title: 'The sheet in the evening, with its lights on (L)' },
];

/** The sheet as drawn, or as it looks in the evening. */
export function DayNight() {
  const editor = useEditor();
  const mode = useSession((s) => s.mode);
  return (
    <fieldset className={styles.modes} aria-label="Show the sheet by">
      {modes.map(({ id, word, title }) => (
        <button
          key={id}
          type="button"
          aria-pressed={mode === id}
          aria-keyshortcuts="L"
          title={title}
          onClick={() => setMode(editor.session, id)}
        >
          <svg viewBox="0 0 20 20" width="16" height="16" aria-hidden="true">
            {id === 'day' ? (
              <>
                <circle cx="10" cy="10" r="3.4" />
                <path d="M10 2.5v2M10 15.5v2M2.5 10h2M15.5 10h2M4.7 4.7l1.4 1.4M13.9 13.9l1.4 1.4M4.7 15.3l1.4-1.4M13.9 6.1l1.4-1.4" />
              </>
            ) : (
              <path d="M15.8 12.4A6.6 6.6 0 0 1 7.6 4.2a6.6 6.6 0 1 0 8.2 8.2z" />
            )}
          </svg>
          {word}
        </button>
      ))}
    </fieldset>
  );
}
