import type { LightSource, NightScene } from '@lampwright/geometry/light';
import { describe, expect, it } from 'vitest';
import { hoursInWords, momentInWords } from './moment-words';
import { oneZone, sampleNight, sampleScene } from './night.testkit';
import { STEP_MINUTES, sheetEvening } from './sheet-evening';
import { lightsGradient, placeOf, skyGradient } from './track';

/** An afternoon in December. */
const NOW = new Date('2026-12-01T20:00:00Z');
const { evening: place } = sampleNight();
const all = () => true;
const groups = new Map([
  ['path', 'Path to the patio'],
  ['bed', 'Shrub bed'],
  ['wall', 'Wall and tree'],
]);
const eveningOf = (scene: NightScene, where = place, now = NOW) =>
  sheetEvening(scene, [scene], where, now, 'en-US', groups);

describe('an evening of a sheet', () => {
  const evening = eveningOf(sampleScene());
  /** The first minute of the line at which its clock shows this. */
  const minuteAt = (clock: string): number => {
    for (let minute = 0; minute <= evening.minutes; minute += STEP_MINUTES)
      if (evening.at(minute).clock.replace(/\s/g, ' ') === clock) return minute;
    throw new Error(`It is never ${clock} on the line.`);
  };
  const onAt = (clock: string): string[] => [...evening.at(minuteAt(clock)).on].sort();

  it('reaches from before sunset to after lights-out, on times that clocks show', () => {
    expect(evening.at(0).sky).toBe('day');
    expect(evening.sunset?.clock).toMatch(/^4:\d\d\sPM$/);
    expect(evening.at(evening.sunset!.minute).sunDegrees).toBeCloseTo(-0.83, 1);
    expect(evening.off?.clock).toMatch(/^11:00\sPM$/);
    expect(evening.at(evening.minutes).on.size).toBe(0);
    expect(evening.at(0).clock).toMatch(/[05]\sPM$/);
    expect(evening.minutes % STEP_MINUTES).toBe(0);
    expect(evening.day).toBe('Dec 1');
  });

  it('switches each zone at its own hours', () => {
    expect(onAt('4:15 PM')).toEqual([]);
    expect(onAt('4:25 PM')).toEqual(['t1', 't2']);
    expect(onAt('9:55 PM')).toEqual(['t1', 't2']);
    expect(onAt('10:00 PM')).toEqual(['t1']);
    expect(onAt('11:00 PM')).toEqual([]);
  });

  it('begins in the dark with all on', () => {
    const first = evening.at(evening.begin);
    expect(first.sky).toBe('dark');
    expect(first.on.size).toBe(2);
    expect(evening.begin % STEP_MINUTES).toBe(0);
  });

  it('names zones in the words of the proposal', () => {
    const names = (
      change: (source: LightSource) => LightSource,
      over: Partial<NightScene> = {},
    ): string[] => {
      const scene = sampleScene(over);
      return eveningOf({ ...scene, sources: scene.sources.map(change) }).zones.map(({ name }) => name);
    };
    const asIs = (source: LightSource): LightSource => source;
    // One is just what is offered as a group; the kind of the other’s lights is its own.
    expect(names(asIs)).toEqual(['Path to the patio', 'Up-lights']);
    expect(evening.zones[0]?.hours).toMatch(/^sunset to 11:00\sPM$/);
    // The one that has nothing of its own comes last.
    const mixed = (source: LightSource): LightSource => ({
      ...source,
      kind: 'up',
      zoneId: source.groupId === 'bed' ? 't2' : 't1',
    });
    expect(names(mixed)).toEqual(['Shrub bed', 'All other lights']);
    const alike = (source: LightSource): LightSource => ({ ...source, kind: 'up', groupId: null });
    expect(names(alike)).toEqual(['Lights of T1', 'Lights of T2']);
    const zones = sampleScene().zones.map((zone, i) =>
      i === 0 ? { ...zone, kind: 'smart' as const, name: 'Pergola' } : zone,
    );
    expect(names(asIs, { zones })).toEqual(['Pergola', 'Up-lights']);
  });

  it('has a line as long as on every other sheet, and switches of its own', () => {
    const scene = sampleScene();
    const part = { ...scene, zones: scene.zones.slice(1), sources: scene.sources.slice(2) };
    const other = sheetEvening(part, [scene, part], place, NOW, 'en-US', groups);
    expect(other.zones.map(({ id }) => id)).toEqual(['t2']);
    expect(other.minutes).toBe(evening.minutes);
    expect(other.off?.clock).toMatch(/^10:00\sPM$/);
  });

  it('is said in words', () => {
    const said = (clock: string, looked: (id: string) => boolean = all): string =>
      momentInWords(evening, evening.at(minuteAt(clock)), looked).replace(/\s/g, ' ');
    expect(said('4:00 PM')).toBe('4:00 PM, daylight, lights off');
    expect(said('4:30 PM')).toBe('4:30 PM, dusk, lights on');
    expect(said('8:15 PM')).toBe('8:15 PM, dark, lights on');
    expect(said('8:15 PM', (id) => id === 't2')).toBe('8:15 PM, dark, Up-lights on');
    expect(said('10:30 PM')).toBe('10:30 PM, dark, Path to the patio on');
    expect(said('11:00 PM')).toBe('11:00 PM, dark, lights off');
  });

  it('says the hours of lights that go on and off together', () => {
    const together = eveningOf(oneZone());
    expect(hoursInWords(together.zones[0]!).replace(/\s/g, ' ')).toBe('Lights on from sunset to 11:00 PM');
  });

  it('is today’s at the property, wherever it is looked at', () => {
    // Already the second of December in London, still the first at the property.
    expect(eveningOf(sampleScene(), place, new Date('2026-12-02T03:00:00Z')).day).toBe('Dec 1');
  });

  it('says plainly that the sunset is assumed', () => {
    const unknown = eveningOf(sampleScene(), { ...place, place: null });
    expect(unknown.sunset?.clock).toMatch(/^6:00\sPM$/);
    expect(unknown.note?.replace(/\s/g, ' ')).toBe(
      'Where the garden lies is not known here, so sunset is taken as 6:00 PM.',
    );
    expect(evening.note).toBeNull();
  });

  it('begins at the darkest moment with lights where it does not get dark', () => {
    // Midsummer at 60° north: the sun sets after ten and is never 12° down.
    const north = { place: { latitude: 60.2, longitude: 24.9 }, timeZone: 'Europe/Helsinki' };
    const bright = eveningOf(oneZone(), north, new Date('2026-06-21T12:00:00Z'));
    const first = bright.at(bright.begin);
    expect(first.on.size).toBe(1);
    expect(first.sky).toBe('dusk');
    expect(bright.off!.minute - bright.begin).toBeLessThanOrEqual(STEP_MINUTES);
  });

  it('has a line where no light goes on', () => {
    // Switched by a sunset that does not come.
    const north = { place: { latitude: 78.2, longitude: 15.6 }, timeZone: 'Arctic/Longyearbyen' };
    const bright = eveningOf(oneZone(), north, new Date('2026-06-21T12:00:00Z'));
    expect(bright.off).toBeNull();
    expect(bright.minutes).toBeGreaterThan(0);
    expect(bright.note).toBe('The sun does not set here on this day.');
    expect(hoursInWords(bright.zones[0]!)).toMatch(/There is no sunset this night/);
  });
});

describe('the track', () => {
  const at = (minute: number) =>
    ({ sunDegrees: -minute / 10 }) as ReturnType<ReturnType<typeof sheetEvening>['at']>;
  const evening = { minutes: 200, at };

  it('is where the thumb’s middle is', () => {
    expect(placeOf(evening, 0)).toBe('calc(0.00% + 15.00px)');
    expect(placeOf(evening, 100)).toBe('calc(50.00% + 0.00px)');
    expect(placeOf(evening, 200)).toBe('calc(100.00% + -15.00px)');
  });

  it('darkens with the sky', () => {
    const sky = skyGradient(evening);
    expect(sky).toContain('rgb(237 230 216) calc(0.00% + 15.00px)');
    expect(sky).toContain('rgb(43 58 85) calc(100.00% + -15.00px)');
  });

  it('shows where lights are on, with stretches that overlap as one', () => {
    const stretches = [
      { stretch: { on: 50, off: 100 } },
      { stretch: { on: 20, off: 60 } },
      { stretch: null },
      { stretch: { on: 150, off: 160 } },
    ];
    const lamps = lightsGradient(evening, stretches).match(/var\(--lamp\) calc\([\d.]+%/g);
    expect(lamps).toEqual([
      'var(--lamp) calc(10.00%',
      'var(--lamp) calc(50.00%',
      'var(--lamp) calc(75.00%',
      'var(--lamp) calc(80.00%',
    ]);
    expect(lightsGradient(evening, [{ stretch: null }])).toBe('none');
  });
});
