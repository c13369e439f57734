import { describe, expect, it } from 'vitest';
import { apply, applyAll, type Change, PLAN_SCHEMA_VERSION, planOf } from './change.js';
import { deleteRecords, drawCable, moveRecords, placeFixture } from './edits/index.js';
import { planProblems } from './integrity.js';
import {
  cable12,
  choice,
  countedIds,
  must,
  pathLight,
  randomEdit,
  seeded,
  sheet,
  startPlan,
} from './plan.testkit.js';
import { rebase, resolveConflicts, restoreTo, reversed, stepOf, undo } from './rebase.js';
import type { PlanDocument } from './records.js';

const asObject = (doc: PlanDocument) => Object.fromEntries(doc);

/** A plan with three fixtures f1, f2, f3, ids given in order of placing. */
function threeFixtures() {
  const ids = countedIds();
  let doc = startPlan();
  const placed: string[] = [];
  for (const x of [100, 200, 300]) {
    const result = placeFixture(
      doc,
      { sheetId: 'sheet1', at: { x, y: 100 }, fixture: choice(pathLight), lamp: null },
      ids,
    );
    doc = apply(doc, must(result));
    if (result.kind === 'change') placed.push(...result.selected);
  }
  const [f1 = '', f2 = '', f3 = ''] = placed;
  return { doc, ids, f1, f2, f3 };
}

describe('rebase', () => {
  it('merges changes of different records', () => {
    const { doc, ids, f1, f2 } = threeFixtures();
    const mine = must(moveRecords(doc, [f1], 5, 0, ids));
    const theirs = must(moveRecords(doc, [f2], 0, 5, ids));
    const result = rebase(doc, apply(doc, theirs), mine);
    expect(result.kind).toBe('merged');
    if (result.kind === 'merged')
      expect(asObject(result.next)).toEqual(asObject(applyAll(doc, [mine, theirs])));
  });

  it('tells the later of two people who changed one record, with all three states', () => {
    const { doc, ids, f1 } = threeFixtures();
    const mine = must(moveRecords(doc, [f1], 5, 0, ids));
    const theirs = must(moveRecords(doc, [f1], 0, 5, ids));
    const present = apply(doc, theirs);
    const result = rebase(doc, present, mine);
    expect(result).toEqual({
      kind: 'conflict',
      conflicts: [
        {
          recordId: f1,
          reason: 'changed',
          message: 'Somebody changed the same fixture as you.',
          base: doc.get(f1),
          theirs: theirs.put[f1],
          mine: mine.put[f1],
        },
      ],
    });
  });

  it('does not call it a conflict when both did the same, or when they put it back', () => {
    const { doc, ids, f1 } = threeFixtures();
    const mine = must(moveRecords(doc, [f1], 5, 0, ids));
    const same = must(moveRecords(doc, [f1], 5, 0, ids));
    expect(rebase(doc, apply(doc, same), mine).kind).toBe('merged');
    const away = must(moveRecords(doc, [f1], 1, 1, ids));
    const there = apply(doc, away);
    const back = must(moveRecords(there, [f1], -1, -1, ids));
    expect(rebase(doc, apply(there, back), mine).kind).toBe('merged');
  });

  it('conflicts on the fixture that somebody removed under a new cable', () => {
    const { doc, ids, f1, f2 } = threeFixtures();
    const mine = must(
      drawCable(
        doc,
        {
          sheetId: 'sheet1',
          stops: [
            { on: 'record', id: f1 },
            { on: 'record', id: f2 },
          ],
          cable: choice(cable12),
        },
        ids,
      ),
    );
    const present = apply(doc, must(deleteRecords(doc, [f2], ids)));
    const result = rebase(doc, present, mine);
    expect(result.kind).toBe('conflict');
    if (result.kind !== 'conflict') return;
    expect(result.conflicts).toMatchObject([{ recordId: f2, reason: 'missing', theirs: null }]);
    expect(result.conflicts[0]?.mine).toEqual(doc.get(f2));

    const kept = resolveConflicts(present, mine, result.conflicts, new Map([[f2, 'mine']]), 'r1');
    const withMine = apply(present, kept);
    expect(withMine.get(f2)).toEqual(doc.get(f2));
    expect([...withMine.values()].filter((r) => r.kind === 'cable')).toHaveLength(1);
    expect(planProblems(withMine)).toEqual([]);

    const given = resolveConflicts(present, mine, result.conflicts, new Map([[f2, 'theirs']]), 'r2');
    const withTheirs = apply(present, given);
    expect(withTheirs.has(f2)).toBe(false);
    expect([...withTheirs.values()].filter((r) => r.kind === 'cable')).toHaveLength(0);
    expect(planProblems(withTheirs)).toEqual([]);
  });

  it.each([11, 12, 13, 14, 15, 16])('seed %i: two authors in random order come to one sound plan', (seed) => {
    const random = seeded(seed);
    let server = startPlan();
    // Each author works on an older plan and keeps unsent changes on top of it.
    const authors = ['a', 'b'].map((name) => ({
      ids: countedIds(`${name}${seed}-`),
      base: server,
      view: server,
      unsent: [] as Change[],
    }));
    let merged = 0;
    let told = 0;
    const send = (author: (typeof authors)[number]) => {
      // What the author saw, with own changes as they are accepted: what others did since is the rest.
      let seen = author.base;
      for (let change of author.unsent) {
        let result = rebase(seen, server, change);
        if (result.kind === 'conflict') {
          told += 1;
          const choices = new Map(
            result.conflicts.map((c) => [
              c.recordId,
              random() < 0.5 ? ('mine' as const) : ('theirs' as const),
            ]),
          );
          change = resolveConflicts(server, change, result.conflicts, choices, author.ids());
          result = rebase(server, server, change);
        }
        expect(result.kind).toBe('merged');
        if (result.kind !== 'merged') return;
        merged += 1;
        server = result.next;
        seen = apply(seen, change);
        expect(planProblems(server)).toEqual([]);
      }
      author.unsent = [];
      author.base = server;
      author.view = server;
    };
    for (let i = 0; i < 300; i += 1) {
      const author = authors[random() < 0.5 ? 0 : 1];
      if (!author) continue;
      if (random() < 0.12) send(author);
      else {
        const change = randomEdit(author.view, random, author.ids);
        if (!change) continue;
        author.unsent.push(change);
        author.view = apply(author.view, change);
      }
    }
    for (const author of authors) send(author);
    for (const author of authors) send(author);
    expect(authors.map((a) => asObject(a.view))[0]).toEqual(asObject(server));
    expect(merged).toBeGreaterThan(60);
    expect(told).toBeGreaterThan(0);
  });
});

describe('undo', () => {
  it('goes back and forth', () => {
    const { doc, ids, f1 } = threeFixtures();
    const change = must(moveRecords(doc, [f1], 5, 0, ids));
    const step = stepOf(doc, change);
    const moved = apply(doc, change);
    const undone = undo(moved, step, ids());
    expect(undone.kept).toEqual([]);
    expect(asObject(apply(moved, undone.change))).toEqual(asObject(doc));
    const redone = undo(apply(moved, undone.change), reversed(step), ids());
    expect(asObject(apply(doc, redone.change))).toEqual(asObject(moved));
  });

  it('leaves what somebody else changed since, and says so', () => {
    const { doc, ids, f1, f2 } = threeFixtures();
    const change = must(moveRecords(doc, [f1, f2], 5, 0, ids));
    const step = stepOf(doc, change);
    const theirs = must(moveRecords(apply(doc, change), [f2], 0, 9, ids));
    const present = applyAll(doc, [change, theirs]);
    const undone = undo(present, step, ids());
    expect(undone.kept).toEqual([f2]);
    const result = apply(present, undone.change);
    expect(result.get(f1)).toEqual(doc.get(f1));
    expect(result.get(f2)).toEqual(theirs.put[f2]);
  });

  it('keeps a fixture that somebody has wired since it was placed', () => {
    const { doc, ids, f1 } = threeFixtures();
    const placing = must(
      placeFixture(
        doc,
        { sheetId: 'sheet1', at: { x: 9, y: 9 }, fixture: choice(pathLight), lamp: null },
        ids,
      ),
    );
    const step = stepOf(doc, placing);
    const placed = apply(doc, placing);
    const added = Object.keys(placing.put)[0] as string;
    const wiring = must(
      drawCable(
        placed,
        {
          sheetId: 'sheet1',
          stops: [
            { on: 'record', id: f1 },
            { on: 'record', id: added },
          ],
          cable: choice(cable12),
        },
        ids,
      ),
    );
    const present = apply(placed, wiring);
    const undone = undo(present, step, ids());
    expect(undone.kept).toEqual([added]);
    expect(apply(present, undone.change).has(added)).toBe(true);
    expect(planProblems(apply(present, undone.change))).toEqual([]);
  });
});

describe('restoreTo', () => {
  it('makes the older plan again as one change', () => {
    const older = planOf([sheet()]);
    const present = planOf([sheet('sheet2', 1), { ...sheet(), name: 'Renamed' }]);
    const change = restoreTo(present, older, 'c');
    expect(change.schema).toBe(PLAN_SCHEMA_VERSION);
    expect(change.remove).toEqual(['sheet2']);
    expect(asObject(apply(present, change))).toEqual(asObject(older));
  });
});
