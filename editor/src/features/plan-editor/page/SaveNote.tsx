import { useEditor, usePlan } from './context';
import styles from './page.module.css';
import type { SaveView } from './plan-port';

const clock = new Intl.DateTimeFormat(undefined, { hour: '2-digit', minute: '2-digit' });

export function saveText(save: SaveView): string {
  switch (save.kind) {
    case 'saved':
      return save.at === null ? 'Saved' : `Saved ${clock.format(save.at)}`;
    case 'saving':
      return 'Saving…';
    case 'offline':
      return `Offline, ${save.unsent} unsent`;
    case 'conflict':
      return 'Needs your choice';
    case 'problem':
      return `Not saved: ${save.message}`;
  }
}

/** Where the work is: always visible, and said to screen readers when it turns for the worse or back. */
export function SaveNote() {
  const editor = useEditor();
  const save = usePlan((s) => s.save);
  const text = saveText(save);
  if (save.kind === 'conflict')
    return (
      <button
        type="button"
        className={styles.attention}
        onClick={() => editor.session.setState({ panel: 'conflicts' })}
      >
        {text}
      </button>
    );
  return (
    <span
      className={styles.saved}
      data-state={save.kind}
      role={save.kind === 'saving' ? undefined : 'status'}
      title={text}
    >
      {text}
    </span>
  );
}
