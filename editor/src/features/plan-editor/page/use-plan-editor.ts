import { type PlanDocument, recordOf, recordsOf } from '@lampwright/geometry/plan';
import { useEffect, useState } from 'react';
import { sentenceOf } from '../../../lib/api/client';
import { createPlanStore } from '../store';
import { PlanEditor } from './editor';
import { portOf } from './plan-port';
import { askEstimate, httpTransport } from './server';
import { exposeTestHandle } from './test-handle';

export interface PlanOwner {
  readonly userId: string;
  readonly companyId: string;
  readonly jobId: string;
}

export type Opening =
  | { readonly is: 'loading' }
  | { readonly is: 'failed'; readonly message: string; readonly retry: () => void }
  | { readonly is: 'open'; readonly editor: PlanEditor };

/** Opens a job's plan for as long as the page is there. Nothing unsent is lost when it goes. */
export function usePlanEditor(
  { userId, companyId, jobId }: PlanOwner,
  canEdit: boolean,
  sheetId: string | null,
  lit: readonly string[] = [],
): Opening {
  const [opening, setOpening] = useState<Opening>({ is: 'loading' });
  // biome-ignore lint/correctness/useExhaustiveDependencies: the sheet and the records named in the address are only where to begin.
  useEffect(() => {
    setOpening({ is: 'loading' });
    const store = createPlanStore({
      owner: { userId, companyId, planId: jobId },
      transport: httpTransport(jobId),
    });
    const port = portOf(store);
    let editor: PlanEditor | null = null;
    let hide: (() => void) | null = null;
    const look = () => {
      const { status, failure, present } = store.document.getState();
      if (editor !== null) return;
      if (status === 'failed') {
        setOpening({
          is: 'failed',
          message: failure ?? 'The plan could not be loaded.',
          retry: () => void store.resume(),
        });
      } else if (status === 'ready') {
        editor = new PlanEditor(port, canEdit, firstSheet(present, sheetId), {
          ask: askEstimate,
          sentence: sentenceOf,
        });
        editor.light(lit);
        hide = exposeTestHandle(editor);
        setOpening({ is: 'open', editor });
      }
    };
    const stopLooking = store.document.subscribe(look);
    const resume = () => {
      if (document.visibilityState !== 'visible') return;
      void store.resume();
      if (editor !== null && editor.estimate.state.getState().problem !== null) editor.estimate.retry();
    };
    window.addEventListener('online', resume);
    document.addEventListener('visibilitychange', resume);
    void store.start();
    return () => {
      window.removeEventListener('online', resume);
      document.removeEventListener('visibilitychange', resume);
      stopLooking();
      hide?.();
      editor?.close();
      port.close();
      store.stop();
    };
  }, [userId, companyId, jobId, canEdit]);
  return opening;
}

function firstSheet(doc: PlanDocument, wanted: string | null): string {
  if (wanted !== null && recordOf(doc, wanted, 'sheet') !== undefined) return wanted;
  return [...recordsOf(doc, 'sheet')].sort((a, b) => a.order - b.order)[0]?.id ?? '';
}
