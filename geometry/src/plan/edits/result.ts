import type { Change } from '../change.js';
import type { Draft } from './draft.js';

export type RefusalCode =
  | 'missing-record'
  | 'wrong-kind'
  | 'wrong-item'
  | 'too-few-points'
  | 'no-name'
  | 'cable-to-itself'
  | 'cable-between-feeds'
  | 'joins-transformers'
  | 'joins-taps'
  | 'joins-windings'
  | 'no-terminals'
  | 'unknown-terminal'
  | 'different-windings'
  | 'in-use'
  | 'out-of-range';

/** The edit as a change to make, with the ids to select afterwards and sentences worth telling. */
export interface Made {
  readonly kind: 'change';
  readonly change: Change;
  readonly selected: string[];
  readonly notes: string[];
}

/** The edit closes a loop or joins two fed ends: ask, then call again with `markedToMarked: true`. */
export interface NeedsConfirmation {
  readonly kind: 'confirm';
  readonly needs: 'marked-to-marked';
  readonly message: string;
}

/** The edit can't be made; the sentence says why. */
export interface Refused {
  readonly kind: 'refused';
  readonly code: RefusalCode;
  readonly message: string;
}

export type EditResult = Made | NeedsConfirmation | Refused;

export function made(draft: Draft, selected: string[] = [], notes: string[] = []): Made {
  return { kind: 'change', change: draft.change(), selected, notes };
}

export function refuse(code: RefusalCode, message: string): Refused {
  return { kind: 'refused', code, message };
}

export function missing(what: string): Refused {
  return refuse('missing-record', `The ${what} is not on the plan any more.`);
}
