import { createStore, type StoreApi } from 'zustand/vanilla';
import type { ProposedPreview } from '../tools/proposed';
import type { Choices, Request } from '../tools/tool';

/** Which panel stands over the drawing, if any. */
export type Panel = 'none' | 'scale' | 'faults' | 'history' | 'conflicts' | 'questions' | 'placing';
/** On a phone, what has slid up over the drawing. */
export type Drawer = 'none' | 'ledger' | 'light' | 'profile' | 'inspector';
/** The sheet as drawn, or as it looks in the evening. */
export type Mode = 'day' | 'night';
/** What stands beside the drawing at night. */
export type Side = 'ledger' | 'light';

export interface SessionState {
  readonly sheetId: string;
  readonly selection: ReadonlySet<string>;
  readonly hoveredId: string | null;
  readonly choices: Choices;
  readonly request: Request | null;
  /** The sentence that the drawing says last. */
  readonly message: string | null;
  readonly panel: Panel;
  readonly drawer: Drawer;
  readonly mode: Mode;
  readonly side: Side;
  /** The run whose profile is shown when the selection is of none. */
  readonly runId: string | null;
  /** What lights are proposed for while their panel is open. */
  readonly placingId: string | null;
  /** The edge of the drawing that it stands at, so that what is to be lit is seen beside it. */
  readonly placingSide: 'start' | 'end';
  /** Lights that are proposed, shown before they are placed. */
  readonly proposed: ProposedPreview | null;
}

const nothing: ReadonlySet<string> = new Set();

/** What a person is at: sheet, choice, tool's choices, panels. Never saved. */
export function createSession(sheetId: string): StoreApi<SessionState> {
  return createStore<SessionState>(() => ({
    sheetId,
    selection: nothing,
    hoveredId: null,
    choices: { fixture: null, transformer: null, cable: null, junction: 'hub', reference: 'length' },
    request: null,
    message: null,
    panel: 'none',
    drawer: 'none',
    mode: 'day',
    side: 'light',
    runId: null,
    placingId: null,
    placingSide: 'start',
    proposed: null,
  }));
}
