import { useQuery, useQueryClient } from '@tanstack/react-query';
import { useEffect, useState } from 'react';
import { useStore } from 'zustand';
import { httpPort, quoteQuery } from './api';
import { localKeeper, type Owner } from './store/kept';
import { type Clock, PricingStore } from './store/pricing-store';

const clock: Clock = {
  after(ms, call) {
    const timer = setTimeout(call, ms);
    return () => clearTimeout(timer);
  },
};

/** Some browsers forbid the storage, by throwing when it is asked for. */
function storageOrNull(): Storage | null {
  try {
    return window.localStorage;
  } catch {
    return null;
  }
}

/** Opens a job's pricing for as long as the page is there. Nothing unsent is lost when it goes. */
export function useJobPricing({ userId, companyId, jobId }: Owner): PricingStore {
  const cache = useQueryClient();
  const make = () =>
    new PricingStore(
      httpPort(jobId),
      localKeeper({ userId, companyId, jobId }, storageOrNull()),
      clock,
      () => void cache.invalidateQueries(quoteQuery(jobId)),
    );
  const [store, setStore] = useState(make);

  // biome-ignore lint/correctness/useExhaustiveDependencies: a store is made once for each person, company and job.
  useEffect(() => {
    const next = make();
    setStore(next);
    void next.start();
    const resume = () => {
      if (document.visibilityState !== 'visible') return;
      next.retry();
      void next.refresh();
    };
    window.addEventListener('online', resume);
    document.addEventListener('visibilitychange', resume);
    return () => {
      window.removeEventListener('online', resume);
      document.removeEventListener('visibilitychange', resume);
      next.stop();
    };
  }, [userId, companyId, jobId]);
  return store;
}

export const usePricing = (store: PricingStore) => useStore(store.state);

/** The price as the server works it out; asked for anew when the plan changes, and told to the store. */
export function useQuote(jobId: string, store: PricingStore) {
  const cache = useQueryClient();
  const quote = useQuery(quoteQuery(jobId));

  useEffect(() => {
    const source = new EventSource(`/api/jobs/${encodeURIComponent(jobId)}/plan/events`);
    let known: string | null = null;
    source.onmessage = ({ data }) => {
      // The first one only says which version there is.
      if (known !== null && data !== known)
        void cache.invalidateQueries({ queryKey: ['pricing', 'job', jobId] });
      known = String(data);
    };
    return () => source.close();
  }, [cache, jobId]);

  const pricingVersion = quote.data?.pricingVersion;
  useEffect(() => {
    if (pricingVersion !== undefined && pricingVersion > store.state.getState().base.version)
      void store.refresh();
  }, [store, pricingVersion]);
  return quote;
}
