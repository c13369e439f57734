import { useEffect, useRef } from 'react';

/** Puts the focus into what is asked and gives it back afterwards. */
export function useFirstFocus<E extends HTMLElement>() {
  const first = useRef<E>(null);
  useEffect(() => {
    const before = document.activeElement;
    first.current?.focus();
    return () => {
      if (before instanceof HTMLElement && before.isConnected) before.focus({ preventScroll: true });
    };
  }, []);
  return first;
}
