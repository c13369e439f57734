import { useEffect } from 'react';
import { Button } from '../../components/button';
import { count } from '../../lib/format';
import styles from './screen.module.css';
import type { PricingState, PricingStore } from './store/pricing-store';

export function saveText({ save, unsent }: Pick<PricingState, 'save' | 'unsent'>): string {
  switch (save.is) {
    case 'saved':
      return unsent === 0 ? 'Saved' : 'Saving…';
    case 'saving':
      return 'Saving…';
    case 'waiting':
      return `Not saved yet, ${count(unsent, 'change')}`;
    case 'refused':
      return `Not saved, ${count(unsent, 'change')}`;
    case 'choosing':
      return 'Needs your choice';
  }
}

const typing = (target: EventTarget | null): boolean =>
  target instanceof HTMLElement && target.matches('input:not([type=checkbox], [type=radio]), textarea');

/** Where the edits are, and the way back and forth between them. */
export function SaveNote({ store, state }: { readonly store: PricingStore; readonly state: PricingState }) {
  const { save, undoLabel, redoLabel } = state;

  useEffect(() => {
    const onKeyDown = (event: KeyboardEvent) => {
      // A field has an undo of its own; a dialog is not the screen beneath it.
      if (event.defaultPrevented || event.altKey || !(event.ctrlKey || event.metaKey)) return;
      if (typing(event.target) || document.querySelector('[role="dialog"]')) return;
      const key = event.key.toLowerCase();
      if (key === 'y' || (key === 'z' && event.shiftKey)) store.redo();
      else if (key === 'z') store.undo();
      else return;
      event.preventDefault();
    };
    window.addEventListener('keydown', onKeyDown);
    return () => window.removeEventListener('keydown', onKeyDown);
  }, [store]);

  return (
    <div className={styles.saving}>
      <span
        className={styles.saveText}
        data-state={save.is}
        role={save.is === 'saving' ? undefined : 'status'}
      >
        {saveText(state)}
      </span>
      {(save.is === 'waiting' || save.is === 'refused') && (
        <Button kind="bare" onClick={() => store.retry()}>
          Try again
        </Button>
      )}
      <Button
        disabled={undoLabel === null}
        title={undoLabel === null ? 'Nothing to undo' : `Undo: ${undoLabel}`}
        onClick={() => store.undo()}
      >
        Undo
      </Button>
      <Button
        disabled={redoLabel === null}
        title={redoLabel === null ? 'Nothing to redo' : `Redo: ${redoLabel}`}
        onClick={() => store.redo()}
      >
        Redo
      </Button>
    </div>
  );
}
