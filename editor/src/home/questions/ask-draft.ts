import type { About } from '../about';

/** A question that is being written. */
export interface AskDraft {
  readonly about: About;
  readonly text: string;
}

export const emptyDraft: AskDraft = { about: { kind: 'whole' }, text: '' };
