import { useEffect } from 'react';
import { tellOpened } from './share';

/** Tells the company that a person looks at it: at the first press or key, once a load. */
export function useOpened(linkId: string): void {
  useEffect(() => {
    const gone = new AbortController();
    const tell = (event: Event): void => {
      if (!event.isTrusted) return;
      gone.abort();
      // Nobody waits for it; the next visit tells it again.
      tellOpened(linkId).catch(() => {});
    };
    for (const kind of ['pointerdown', 'keydown'])
      window.addEventListener(kind, tell, { signal: gone.signal, capture: true, passive: true });
    return () => gone.abort();
  }, [linkId]);
}
