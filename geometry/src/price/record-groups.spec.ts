import { describe, expect, it } from 'vitest';
import { cableLengths, estimateRequestOf } from '../estimate/index.js';
import {
  apply,
  drawCable,
  type EditResult,
  type PlanDocument,
  placeFixture,
  placeJunction,
  placeTransformer,
  planProblems,
  recordsOf,
} from '../plan/index.js';
import {
  cable12,
  choice,
  countedIds,
  must,
  pathLight,
  randomEdit,
  seeded,
  startPlan,
  transformer300,
} from '../plan/plan.testkit.js';
import { combinationsOf, type JobPricing, planWith, recordGroups } from './index.js';

const sheetId = 'sheet1';

/** A transformer, and lights wired as the paths say: node names by letter, T the transformer. */
function wired(paths: readonly string[], splices = '') {
  const ids = countedIds();
  let doc: PlanDocument = startPlan();
  const make = (edit: EditResult) => {
    doc = apply(doc, must(edit));
    return edit.kind === 'change' ? edit.selected : [];
  };
  const nodes = new Map<string, string>();
  const cables = new Map<string, string>();
  const nodeOf = (name: string, i: number): string => {
    const at = { x: 100 * i + 17 * nodes.size, y: 60 * nodes.size };
    const found = nodes.get(name);
    if (found) return found;
    const [id = ''] =
      name === 'T'
        ? make(placeTransformer(doc, { sheetId, at, transformer: choice(transformer300) }, ids))
        : splices.includes(name)
          ? make(placeJunction(doc, { sheetId, at, style: 'splice', item: null }, ids))
          : make(placeFixture(doc, { sheetId, at, fixture: choice(pathLight), lamp: null }, ids));
    nodes.set(name, id);
    return id;
  };
  for (const path of paths) {
    const stops = [...path].map((name, i) => ({ on: 'record' as const, id: nodeOf(name, i) }));
    const made = make(drawCable(doc, { sheetId, stops, cable: choice(cable12), markedToMarked: true }, ids));
    [...path].slice(1).forEach((name, i) => {
      cables.set(`${path[i]}${name}`, made[i] ?? '');
    });
  }
  const id = (name: string) => nodes.get(name) ?? name;
  const pricing = (members: Record<string, string>): Pick<JobPricing, 'groups' | 'members'> => ({
    groups: [...new Set(Object.values(members))].map((g) => ({ id: g, name: g, description: '', on: true })),
    members: Object.fromEntries(Object.entries(members).map(([name, g]) => [id(name), g])),
  });
  const told = (members: Record<string, string>) => {
    const groups = recordGroups(doc, pricing(members));
    return Object.fromEntries([...cables].map(([name, cable]) => [name, groups.get(cable) ?? null]));
  };
  return { doc, id, cables, pricing, told };
}

describe('which group cable is part of', () => {
  it('is that of the lights beyond it; home runs and shared cable are in the base', () => {
    const plan = wired(['TABC', 'BDE']);
    expect(plan.told({ A: 'p', B: 'p', C: 'p', D: 'q', E: 'q' })).toEqual({
      TA: null,
      AB: null,
      BC: 'p',
      BD: 'q',
      DE: 'q',
    });
    // C in no group is in the base, and needs its cable always.
    expect(plan.told({ A: 'p', B: 'p', D: 'q', E: 'q' })).toMatchObject({ AB: null, BC: null, BD: 'q' });
  });

  it('is one group for all of a loop, and the base where the loop serves two', () => {
    const plan = wired(['TA', 'ABCA', 'CD']);
    expect(plan.told({ A: 'p', B: 'q', C: 'q', D: 'q' })).toEqual({
      TA: null,
      AB: 'q',
      BC: 'q',
      CA: 'q',
      CD: 'q',
    });
    expect(plan.told({ A: 'p', B: 'q', C: 'p', D: 'q' })).toMatchObject({
      AB: null,
      BC: null,
      CA: null,
      CD: 'q',
    });
  });

  it('counts a home run through splices as one', () => {
    const plan = wired(['TXA', 'XB'], 'X');
    expect(plan.told({ A: 'p', B: 'q' })).toEqual({ TX: null, XA: null, XB: null });
  });

  it('goes with a splice that has only its cable', () => {
    const plan = wired(['TAXB', 'XC'], 'X');
    const members = { A: 'p', B: 'q', C: 'q' };
    expect(recordGroups(plan.doc, plan.pricing(members)).get(plan.id('X'))).toBe('q');
    const left = planWith(plan.doc, plan.pricing(members), new Set(['p']));
    expect(left.has(plan.id('X'))).toBe(false);
    expect([...recordsOf(left, 'fixture')].map(({ id }) => id)).toEqual([plan.id('A')]);
  });
});

describe('the plan with some of its groups', () => {
  it('leaves a splice where a light was passed through, and the cable as long as it was', () => {
    const plan = wired(['TAB']);
    const pricing = plan.pricing({ A: 'p', B: 'q' });
    const left = planWith(plan.doc, pricing, new Set(['q']));
    expect(left.get(plan.id('A'))).toMatchObject({ kind: 'junction', style: 'splice' });
    expect([...recordsOf(left, 'cable')]).toHaveLength(2);
    const before = cableLengths(plan.doc);
    for (const [id, length] of cableLengths(left))
      expect(length.totalMeters).toBeCloseTo(before.get(id)?.totalMeters ?? Number.NaN, 12);
  });

  const seed = Date.now() % 1_000_000_007;
  it(`is whole, and feeds every light that is taken, for random plans (seed ${seed})`, () => {
    const random = seeded(seed);
    let sets = 0;
    let removed = 0;
    for (let n = 0; n < 40; n++) {
      const ids = countedIds(`n${n}-`);
      let doc: PlanDocument = startPlan();
      for (let edit = 0; edit < 60; edit++) {
        const change = randomEdit(doc, random, ids);
        if (change) doc = apply(doc, change);
      }
      const groups = ['a', 'b', 'c'].map((id) => ({ id, name: id, description: '', on: true }));
      const members = Object.fromEntries(
        [...recordsOf(doc, 'fixture')].flatMap(({ id }) => {
          const group = groups[Math.floor(random() * 4)];
          return group ? [[id, group.id]] : [];
        }),
      );
      const fed = fedFixtures(doc);
      for (const set of combinationsOf({ groups })) {
        const left = planWith(doc, { groups, members }, new Set(set));
        expect(planProblems(left)).toEqual([]);
        const taken = [...recordsOf(doc, 'fixture')].filter(({ id }) => {
          const group = members[id];
          return group === undefined || set.includes(group);
        });
        expect([...recordsOf(left, 'fixture')].map(({ id }) => id).sort()).toEqual(
          taken.map(({ id }) => id).sort(),
        );
        const still = fedFixtures(left);
        for (const { id } of taken) expect(still.has(id), `${id} of plan ${n} with ${set}`).toBe(fed.has(id));
        sets += 1;
        removed += [...recordsOf(doc, 'cable')].length - [...recordsOf(left, 'cable')].length;
      }
      expect(planWith(doc, { groups, members }, new Set(['a', 'b', 'c'])).size).toBe(doc.size);
    }
    // The walk is worth something only if cable did go.
    expect(sets).toBe(320);
    expect(removed).toBeGreaterThan(0);
  });
});

function fedFixtures(doc: PlanDocument): Set<string> {
  const { request } = estimateRequestOf(doc);
  return new Set(request?.runs.flatMap((run) => run.fixtures.map(({ id }) => id)));
}
