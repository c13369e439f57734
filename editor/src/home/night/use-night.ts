import { useCallback, useEffect, useState } from 'react';
import { getNight, type SharedNight } from '../share';

type Parts = typeof import('./parts');

export type Night =
  | { readonly kind: 'loading' }
  | { readonly kind: 'failed' }
  | { readonly kind: 'ready'; readonly night: SharedNight; readonly parts: Parts };

/** What draws evenings, and what they are drawn from: asked for only once the garden is seen by day. */
export function useNight(
  linkId: string,
  revisionId: string,
  wanted: boolean,
): { readonly night: Night; readonly fail: () => void; readonly retry: () => void } {
  const [night, setNight] = useState<Night>({ kind: 'loading' });
  const [attempt, setAttempt] = useState(0);

  // biome-ignore lint/correctness/useExhaustiveDependencies: another revision has other lights
  useEffect(() => {
    setNight({ kind: 'loading' });
    if (!wanted) return;
    let gone = false;
    const load = async (): Promise<void> => {
      await afterPaint();
      if (gone) return;
      try {
        const [parts, shared] = await Promise.all([import('./parts'), getNight(linkId)]);
        if (!gone) setNight({ kind: 'ready', parts, night: shared });
      } catch {
        if (!gone) setNight({ kind: 'failed' });
      }
    };
    void load();
    return () => {
      gone = true;
    };
  }, [linkId, revisionId, wanted, attempt]);

  const fail = useCallback(() => setNight({ kind: 'failed' }), []);
  const retry = useCallback(() => setAttempt((before) => before + 1), []);
  return { night, fail, retry };
}

const afterPaint = (): Promise<void> =>
  new Promise((resolve) => requestAnimationFrame(() => setTimeout(resolve)));
