import { useCallback, useEffect, useState } from 'react';

/** Often at first, then more seldom, for ten minutes in all. */
const DELAYS_MS = [...Array(15).fill(2000), ...Array(24).fill(5000), ...Array(30).fill(15_000)] as number[];

/**
 * Asks again and again while something is awaited; not while the page is out of sight.
 * @returns whether it has given up, and how to begin anew
 */
export function useWatch(
  awaited: boolean,
  ask: () => Promise<unknown>,
): { tired: boolean; again: () => void } {
  const [turn, setTurn] = useState(0);
  const tired = awaited && turn >= DELAYS_MS.length;

  useEffect(() => {
    const delay = DELAYS_MS[turn];
    if (!awaited || delay === undefined) return;
    const timer = setTimeout(async () => {
      // No answer is no news: the next turn asks again.
      if (!document.hidden) await ask().catch(() => {});
      setTurn((now) => now + 1);
    }, delay);
    return () => clearTimeout(timer);
  }, [awaited, ask, turn]);

  useEffect(() => {
    if (!awaited) setTurn(0);
  }, [awaited]);

  const again = useCallback(() => {
    ask().catch(() => {});
    setTurn(0);
  }, [ask]);
  return { tired, again };
}
