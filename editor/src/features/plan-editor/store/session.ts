import type { PlanDocument } from '@lampwright/geometry/plan';
import { createStore } from 'zustand/vanilla';

export interface SessionState {
  /** Chosen records, in the order of choosing. */
  readonly selection: readonly string[];
  readonly toolId: string;
  readonly sheetId: string | null;
  readonly hoverId: string | null;
}

export type Session = ReturnType<typeof createSession>;

/** What a person is at: chosen records, tool, sheet. Never saved. */
export function createSession() {
  const store = createStore<SessionState>(() => ({
    selection: [],
    toolId: 'select',
    sheetId: null,
    hoverId: null,
  }));
  const { getState, setState } = store;
  return {
    store,
    select(ids: Iterable<string>): void {
      setState({ selection: [...new Set(ids)] });
    },
    /** Adds to the choice, or takes out what is chosen already. */
    toggle(id: string): void {
      const { selection } = getState();
      setState({
        selection: selection.includes(id) ? selection.filter((other) => other !== id) : [...selection, id],
      });
    },
    useTool(toolId: string): void {
      if (toolId !== getState().toolId) setState({ toolId, hoverId: null });
    },
    /** Records of one sheet are chosen at a time. */
    openSheet(sheetId: string | null): void {
      if (sheetId !== getState().sheetId) setState({ sheetId, selection: [], hoverId: null });
    },
    hover(hoverId: string | null): void {
      if (hoverId !== getState().hoverId) setState({ hoverId });
    },
    /** Forgets what is no longer on the plan, and opens a sheet when none is open. */
    follow(plan: PlanDocument): void {
      const { selection, hoverId, sheetId } = getState();
      const kept = selection.filter((id) => plan.has(id));
      const sheet = sheetId !== null && plan.has(sheetId) ? sheetId : firstSheet(plan);
      const hover = hoverId !== null && plan.has(hoverId) ? hoverId : null;
      if (kept.length === selection.length && sheet === sheetId && hover === hoverId) return;
      setState({ selection: kept, sheetId: sheet, hoverId: hover });
    },
  };
}

function firstSheet(plan: PlanDocument): string | null {
  let first: { id: string; order: number } | null = null;
  for (const record of plan.values())
    if (record.kind === 'sheet' && (first === null || record.order < first.order)) first = record;
  return first?.id ?? null;
}
