import { useEffect, useSyncExternalStore } from 'react';
import { type ThemeChoice, themeSchema, useMaybeMe } from '../lib/me';

/** Remembered per browser, so that the page does not flash light before the person is known. */
const KEY = 'lampwright.theme';

const dark = () => window.matchMedia('(prefers-color-scheme: dark)');

function remembered(): ThemeChoice {
  try {
    return themeSchema.catch('system').parse(localStorage.getItem(KEY));
  } catch {
    // Storage can be turned off; the system's choice will do.
    return 'system';
  }
}

function remember(choice: ThemeChoice): void {
  try {
    localStorage.setItem(KEY, choice);
  } catch {
    // As above: nothing depends on it.
  }
}

/** Light or dark: what the person chose, else what their system says. */
export function useAppearance(): 'light' | 'dark' {
  const me = useMaybeMe();
  const own = me.data?.user.preferences.theme;
  const choice = own ?? remembered();
  useEffect(() => {
    if (own) remember(own);
  }, [own]);
  const systemIsDark = useSyncExternalStore(
    (changed) => {
      const query = dark();
      query.addEventListener('change', changed);
      return () => query.removeEventListener('change', changed);
    },
    () => dark().matches,
  );
  if (choice === 'system') return systemIsDark ? 'dark' : 'light';
  return choice;
}
