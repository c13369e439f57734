import { useCallback, useRef, useState } from 'react';
import { problemOf, type Trouble } from './trouble';

/** Something that a button does: one at a time, and its failure is told beside the button. */
export function useAction<In extends unknown[]>(
  act: (...input: In) => Promise<void>,
): {
  readonly busy: boolean;
  readonly trouble: Trouble | null;
  readonly run: (...input: In) => void;
} {
  const [busy, setBusy] = useState(false);
  const [trouble, setTrouble] = useState<Trouble | null>(null);
  const running = useRef(false);
  const newest = useRef(act);
  newest.current = act;

  const run = useCallback((...input: In) => {
    if (running.current) return;
    running.current = true;
    setBusy(true);
    setTrouble(null);
    newest
      .current(...input)
      .catch((error: unknown) => setTrouble(problemOf(error)))
      .finally(() => {
        running.current = false;
        setBusy(false);
      });
  }, []);
  return { busy, trouble, run };
}
