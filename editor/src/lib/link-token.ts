import { useState } from 'react';

/** The token of a mail link, from the part of the address that is never sent to a server or logged. */
export function tokenOf(hash: string): string {
  return new URLSearchParams(hash.replace(/^#/, '')).get('token') ?? '';
}

/** Reads the token once, and takes it out of the address bar and the history. */
export function useLinkToken(): string {
  const [token] = useState(() => {
    const found = tokenOf(window.location.hash);
    if (found !== '')
      window.history.replaceState(
        window.history.state,
        '',
        window.location.pathname + window.location.search,
      );
    return found;
  });
  return token;
}
