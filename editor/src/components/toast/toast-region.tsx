import { useCallback, useEffect, useRef, useState, useSyncExternalStore } from 'react';
import { sentenceOf } from '../../lib/api/client';
import styles from './toast.module.css';
import { closeToast, currentToasts, showProblem, subscribeToasts, type Toast } from './toasts';

/** Where toasts appear; one in the whole app. */
export function ToastRegion() {
  const toasts = useSyncExternalStore(subscribeToasts, currentToasts);
  return (
    <section className={styles.region} aria-label="Messages" aria-live="polite" aria-relevant="additions">
      {toasts.map((toast) => (
        <ToastCard key={toast.id} toast={toast} />
      ))}
    </section>
  );
}

function ToastCard({ toast }: { toast: Toast }) {
  const [held, setHeld] = useState(false);
  const [busy, setBusy] = useState(false);
  const timer = useRef<ReturnType<typeof setTimeout>>(undefined);
  const close = useCallback(() => closeToast(toast.id), [toast.id]);

  useEffect(() => {
    if (toast.lifeMs === null || held || busy) return;
    timer.current = setTimeout(close, toast.lifeMs);
    return () => clearTimeout(timer.current);
  }, [toast.lifeMs, held, busy, close]);

  const undo = async () => {
    if (!toast.undo) return;
    setBusy(true);
    try {
      await toast.undo();
      close();
    } catch (error) {
      close();
      showProblem(sentenceOf(error));
    }
  };

  return (
    // biome-ignore lint/a11y/noStaticElementInteractions: holding it open on hover adds nothing to operate
    <div
      className={styles.toast}
      data-tone={toast.tone}
      onPointerEnter={() => setHeld(true)}
      onPointerLeave={() => setHeld(false)}
      onFocus={() => setHeld(true)}
      onBlur={() => setHeld(false)}
    >
      <span className={styles.message}>{toast.message}</span>
      {toast.undo && (
        <button type="button" className={styles.undo} onClick={undo} disabled={busy}>
          {toast.undoLabel}
        </button>
      )}
      <button type="button" className={styles.close} onClick={close} aria-label="Close this message">
        <svg viewBox="0 0 16 16" width="14" height="14" aria-hidden="true">
          <path d="M3 3l10 10M13 3L3 13" stroke="currentColor" strokeWidth="1.75" strokeLinecap="round" />
        </svg>
      </button>
    </div>
  );
}
