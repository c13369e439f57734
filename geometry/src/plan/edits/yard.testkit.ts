import { expect } from 'vitest';
import { apply } from '../change.js';
import { planProblems } from '../integrity.js';
import {
  cable12,
  cable16,
  choice,
  countedIds,
  must,
  pathLight,
  startPlan,
  transformer300,
} from '../plan.testkit.js';
import type { CableRecord, PlanDocument, RunRecord } from '../records.js';
import {
  type CableStop,
  deleteRecords,
  drawCable,
  type EditResult,
  placeFixture,
  placeTransformer,
} from './index.js';

/** A plan under edit, with names for what was placed. */
export class Yard {
  doc: PlanDocument = startPlan();
  readonly ids = countedIds();

  do(result: EditResult): string[] {
    this.doc = apply(this.doc, must(result));
    expect(planProblems(this.doc)).toEqual([]);
    return result.kind === 'change' ? result.selected : [];
  }
  fixture(x: number, y: number, sheetId = 'sheet1'): string {
    const placing = { sheetId, at: { x, y }, fixture: choice(pathLight), lamp: null };
    return this.do(placeFixture(this.doc, placing, this.ids))[0] ?? '';
  }
  transformer(item = transformer300): string {
    const placing = { sheetId: 'sheet1', at: { x: 0, y: 0 }, transformer: choice(item) };
    return this.do(placeTransformer(this.doc, placing, this.ids))[0] ?? '';
  }
  try(
    stops: readonly (string | CableStop)[],
    more: { markedToMarked?: boolean; runId?: string; gauge?: 16 } = {},
  ) {
    const { gauge, ...rest } = more;
    return drawCable(
      this.doc,
      {
        sheetId: 'sheet1',
        stops: stops.map((stop) => (typeof stop === 'string' ? { on: 'record', id: stop } : stop)),
        cable: choice(gauge === 16 ? cable16 : cable12),
        ...rest,
      },
      this.ids,
    );
  }
  cable(...args: Parameters<Yard['try']>): string[] {
    return this.do(this.try(...args));
  }
  delete(...ids: string[]) {
    this.do(deleteRecords(this.doc, ids, this.ids));
  }
  cables(): CableRecord[] {
    return [...this.doc.values()].filter((r) => r.kind === 'cable');
  }
  runs(): RunRecord[] {
    return [...this.doc.values()].filter((r) => r.kind === 'run');
  }
  get(id: string | undefined) {
    return this.doc.get(id ?? '');
  }
}
