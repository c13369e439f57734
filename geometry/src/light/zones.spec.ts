import { describe, expect, it } from 'vitest';
import { addZone, type Schedule, usualSchedule } from '../plan/index.js';
import { pathLight } from '../plan/plan.testkit.js';
import { Garden } from './scene.testkit.js';
import { controlZonesOf, UNFED_ZONE_ID } from './zones.js';

const late: Schedule = { on: { kind: 'sunset', minutesAfter: 30 }, off: { kind: 'clock', at: '01:00' } };
const smartLight = { ...pathLight, name: 'Smart path light', smart: true } as typeof pathLight;

/** T1 with two runs of two lights each. */
function yard() {
  const garden = new Garden();
  const t = garden.transformer();
  const ids = [100, 200, 300, 400].map((x) => garden.light(pathLight, x, 100));
  const [a = '', b = '', c = '', d = ''] = ids;
  const path = garden.run(t, a, b);
  const bed = garden.run(t, c, d);
  garden.set('run', [path], { name: 'path' });
  garden.set('run', [bed], { name: 'shrub bed' });
  return { garden, t, a, b, c, d, path, bed };
}

describe('control zones', () => {
  it('are transformers: all runs on one switch together', () => {
    const { garden, t, a, d } = yard();
    const { zones, zoneOf, together } = controlZonesOf(garden.doc);
    expect(zones).toEqual([{ id: t, kind: 'feed', name: 'T1', schedule: usualSchedule }]);
    expect([zoneOf.get(a), zoneOf.get(d)]).toEqual([t, t]);
    expect(together).toEqual(['Path and shrub bed hang on T1 and switch together.']);
  });

  it('take the transformer’s schedule before the plan’s', () => {
    const { garden, t } = yard();
    garden.set('transformer', [t], { schedule: late });
    expect(controlZonesOf(garden.doc).zones[0]?.schedule).toEqual(late);
  });

  it('are runs with a switch of their own', () => {
    const { garden, t, a, c, bed } = yard();
    garden.set('run', [bed], { schedule: late });
    const { zones, zoneOf, together } = controlZonesOf(garden.doc);
    expect(zones.map(({ id, kind, name }) => [id, kind, name])).toEqual([
      [t, 'feed', 'T1'],
      [bed, 'run', 'Shrub bed'],
    ]);
    expect([zoneOf.get(a), zoneOf.get(c)]).toEqual([t, bed]);
    expect(together).toEqual([
      'Path hangs on T1 and switches with it.',
      'Shrub bed hangs on T1 with a switch of its own and can be on by itself.',
    ]);
  });

  it('are zones of smart lamps; a plain lamp in one stays with its feed and is told of', () => {
    const { garden, t, a } = yard();
    const smart = garden.light(smartLight, 500, 100);
    garden.run(a, smart);
    garden.do(addZone(garden.doc, { name: 'Entry', schedule: late }, [smart, a], garden.ids));
    const { zones, zoneOf, together } = controlZonesOf(garden.doc);
    const entry = zones.find(({ kind }) => kind === 'smart');
    expect(entry).toMatchObject({ name: 'Entry', schedule: late });
    expect(zoneOf.get(smart)).toBe(entry?.id);
    expect(zoneOf.get(a)).toBe(t);
    expect(together.slice(1)).toEqual([
      'Entry switches by itself: P5. They switch apart from T1, which must stay on for as long as they are to be lit.',
      'P1 is put in Entry, but its lamp can’t switch by itself: it is on with the feed.',
    ]);
  });

  it('name several transformers as apart, and lights without wiring as open', () => {
    const { garden } = yard();
    const t2 = garden.transformer(0, 900);
    const fed = garden.light(pathLight, 100, 900);
    garden.run(t2, fed);
    const loose = garden.light(pathLight, 900, 900);
    const { zones, zoneOf, together } = controlZonesOf(garden.doc);
    expect(zoneOf.get(loose)).toBe(UNFED_ZONE_ID);
    expect(zones.at(-1)).toEqual({
      id: UNFED_ZONE_ID,
      kind: 'feed',
      name: 'Not wired yet',
      schedule: usualSchedule,
    });
    expect(together.slice(1)).toEqual([
      'Run 3 hangs on T2 and switches with it.',
      'T1 and T2 can be switched apart from one another.',
      'P6 is not wired yet; the wiring will say what switches with what.',
    ]);
  });

  it('in a scene are those of its lights', () => {
    const { garden, t } = yard();
    expect(garden.scene().zones.map(({ id }) => id)).toEqual([t]);
    expect(new Set(garden.scene().sources.map(({ zoneId }) => zoneId))).toEqual(new Set([t]));
  });
});
