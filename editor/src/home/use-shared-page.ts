import { useCallback, useEffect, useRef, useState } from 'react';
import { getPage, type SharedPage } from './share';
import { problemOf, type Trouble } from './trouble';

export type Loaded =
  | { readonly kind: 'loading' }
  | { readonly kind: 'failed'; readonly trouble: Trouble }
  | { readonly kind: 'ready'; readonly page: SharedPage };

export interface SharedPageState {
  readonly loaded: Loaded;
  /** From the beginning, with the outline of the page meanwhile. */
  readonly retry: () => void;
  /** Asks again behind what is shown. A failure leaves it as it is, and is thrown. */
  readonly refresh: () => Promise<SharedPage>;
  /** What an action was answered with. */
  readonly replace: (page: SharedPage) => void;
}

export function useSharedPage(linkId: string): SharedPageState {
  const [loaded, setLoaded] = useState<Loaded>({ kind: 'loading' });
  // An answer that was asked for before a later one was shown is old.
  const turn = useRef(0);

  const replace = useCallback((page: SharedPage) => {
    turn.current++;
    setLoaded({ kind: 'ready', page });
  }, []);

  const refresh = useCallback(async () => {
    const mine = ++turn.current;
    const page = await getPage(linkId);
    if (mine === turn.current) setLoaded({ kind: 'ready', page });
    return page;
  }, [linkId]);

  const retry = useCallback(() => {
    setLoaded({ kind: 'loading' });
    refresh().catch((error: unknown) => setLoaded({ kind: 'failed', trouble: problemOf(error) }));
  }, [refresh]);

  useEffect(retry, [retry]);
  return { loaded, retry, refresh, replace };
}
