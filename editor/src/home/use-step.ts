import { useCallback, useEffect, useState } from 'react';

/** The page itself, and the two screens that lie in front of it. */
export type Step = 'page' | 'review' | 'decline';

const stepOf = (hash: string): Step => {
  switch (hash) {
    case '#review':
      return 'review';
    case '#decline':
      return 'decline';
    default:
      return 'page';
  }
};

/** The step is part of the address, so that the browser’s back button leads out of it. */
export function useStep(): {
  readonly step: Step;
  readonly open: (step: 'review' | 'decline') => void;
  /** Back to the page; `done` leaves nothing to come back to. */
  readonly close: (how?: 'back' | 'done') => void;
} {
  const [step, setStep] = useState<Step>(() => stepOf(window.location.hash));

  useEffect(() => {
    const follow = (): void => setStep(stepOf(window.location.hash));
    window.addEventListener('popstate', follow);
    return () => window.removeEventListener('popstate', follow);
  }, []);

  const open = useCallback((to: 'review' | 'decline') => {
    window.history.pushState({ fromPage: true }, '', `#${to}`);
    setStep(to);
  }, []);

  const close = useCallback((how: 'back' | 'done' = 'back') => {
    const opened: unknown = window.history.state?.fromPage;
    if (how === 'back' && opened === true) {
      window.history.back();
      return;
    }
    window.history.replaceState(null, '', window.location.pathname + window.location.search);
    setStep('page');
  }, []);

  return { step, open, close };
}
