import { useEffect, useState } from 'react';

/** The token of a mail link, from the part of the address that is never sent to a server or logged. */
export function tokenOf(hash: string): string {
  return new URLSearchParams(hash.replace(/^#/, '')).get('token') ?? '';
}

/** Reads the token once, and takes it out of the address bar and the history. */
export function useLinkToken(): string {
  const [token] = useState(() => tokenOf(window.location.hash));
  // Not while rendering: a rendering that React throws away would take the token with it.
  useEffect(() => {
    if (token === '') return;
    const { pathname, search } = window.location;
    window.history.replaceState(window.history.state, '', `${pathname}${search}`);
  }, [token]);
  return token;
}
