import type { NoProposal, Proposal } from '@lampwright/geometry/light';
import { createContext, useContext, useEffect, useMemo, useState } from 'react';
import { useDoc, useEditor } from '../page/context';
import type { LightsToPlace } from '../tools/proposed';
import { lightsOn, previewOf } from './place-lights';
import { type Proposer, proposerInWorker } from './proposer';
import type { Asking } from './subject';

/** How whoever works out proposals is started; tests work them out where they are. */
export const ProposerContext = createContext<() => Proposer>(proposerInWorker);

/** Changes closer together than this make one question. */
const REST_MS = 150;

export interface Proposed {
  readonly result: Proposal | NoProposal | null;
  /** What can be placed now; null while there is nothing, or nothing that is up to date. */
  readonly placing: LightsToPlace | null;
  readonly working: boolean;
  readonly problem: string | null;
  readonly retry: () => void;
}

interface Answered {
  readonly key: string;
  readonly result: Proposal | NoProposal | null;
  readonly problem: string | null;
}

/** Asks for a proposal whenever what it is made from has changed, and shows it on the drawing. */
export function useProposal(asking: Asking): Proposed {
  const editor = useEditor();
  const doc = useDoc();
  const start = useContext(ProposerContext);
  const [proposer, setProposer] = useState<Proposer | null>(null);
  const [answered, setAnswered] = useState<Answered | null>(null);
  const [tries, setTries] = useState(0);
  const asked = asking.is === 'ask' ? asking : null;
  const key = useMemo(() => (asked === null ? null : JSON.stringify(asked.ask)), [asked]);

  useEffect(() => {
    const started = start();
    setProposer(started);
    return () => started.close();
  }, [start]);

  // biome-ignore lint/correctness/useExhaustiveDependencies: the key is all that a question is made of.
  useEffect(() => {
    if (proposer === null || key === null || asked === null) return;
    let wanted = true;
    const take = (answer: Omit<Answered, 'key'>) => {
      if (wanted) setAnswered({ key, ...answer });
    };
    const timer = setTimeout(() => {
      proposer.propose(asked.ask).then(
        (result) => take({ result, problem: null }),
        (error: unknown) =>
          take({ result: null, problem: error instanceof Error ? error.message : String(error) }),
      );
    }, REST_MS);
    return () => {
      wanted = false;
      clearTimeout(timer);
    };
  }, [proposer, key, tries]);

  const fresh = answered !== null && answered.key === key;
  const result = key === null ? null : (answered?.result ?? null);
  const sheetId = asked?.ask.scene.sheetId;
  const scale = asked?.scale;
  const placing = useMemo(
    () =>
      fresh && result?.kind === 'proposal' && scale !== undefined && sheetId !== undefined
        ? lightsOn(sheetId, scale, result)
        : null,
    [fresh, result, scale, sheetId],
  );
  useEffect(() => {
    const preview =
      placing === null || scale === undefined || result?.kind !== 'proposal'
        ? null
        : previewOf(doc, scale, result, placing);
    editor.session.setState({ proposed: preview });
    return () => editor.session.setState({ proposed: null });
  }, [editor, doc, placing, result, scale]);
  return {
    result,
    placing,
    working: key !== null && !fresh,
    problem: fresh ? answered.problem : null,
    retry: () => {
      setAnswered(null);
      setTries(tries + 1);
    },
  };
}
