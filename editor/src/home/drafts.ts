import { useCallback, useState } from 'react';

/** What somebody wrote and has not sent yet: kept in this tab, through a reload. */
export function useDraft<Draft>(name: string, empty: Draft): [Draft, (draft: Draft) => void] {
  const [draft, setDraft] = useState<Draft>(() => read(name) ?? empty);
  const keep = useCallback(
    (next: Draft) => {
      setDraft(next);
      write(name, next);
    },
    [name],
  );
  return [draft, keep];
}

const keyOf = (name: string): string => `lampwright-home:${name}`;

// Private windows may refuse storage: then a draft lasts as long as the page.
function read<Draft>(name: string): Draft | null {
  try {
    const text = sessionStorage.getItem(keyOf(name));
    return text === null ? null : (JSON.parse(text) as Draft);
  } catch {
    return null;
  }
}

function write(name: string, draft: unknown): void {
  try {
    sessionStorage.setItem(keyOf(name), JSON.stringify(draft));
  } catch {
    // As above.
  }
}
