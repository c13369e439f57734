import { describe, expect, it } from 'vitest';
import { figuresCsv, gridCsv } from './csv.js';
import { luxAlong, luxWithin } from './grid.js';
import { lamp, spaceWith } from './light.testkit.js';
import {
  besideMoonlight,
  FULL_MOON_LUX,
  fromLuxUnit,
  inLuxUnit,
  LUX_PER_FOOT_CANDLE,
  luxText,
  shortOf,
  usualTargets,
} from './target.js';

const row = Array.from({ length: 4 }, (_, i) => lamp([3 * i, 0, 0.6], { lumens: 190 }, 120));
const path = luxAlong(spaceWith({ sources: row }), [
  { x: 0, y: 0.5 },
  { x: 9, y: 0.5 },
])!;

describe('lux and foot-candles', () => {
  it('go over into one another by 10.7639', () => {
    // One lumen per square foot; 1 ft = 0.3048 m exactly (international yard and pound agreement).
    expect(LUX_PER_FOOT_CANDLE).toBeCloseTo(10.7639, 4);
    expect(inLuxUnit(10.7639, 'foot-candle')).toBeCloseTo(1, 4);
    expect(fromLuxUnit(0.5, 'foot-candle')).toBeCloseTo(5.382, 3);
    expect(fromLuxUnit(inLuxUnit(7, 'foot-candle'), 'foot-candle')).toBeCloseTo(7, 12);
  });

  it('are shown with digits that the eye can use, more only beside a limit', () => {
    expect(luxText(0.123, 'lux')).toBe('0.12 lx');
    expect(luxText(6.16, 'lux')).toBe('6.2 lx');
    expect(luxText(140.4, 'lux')).toBe('140 lx');
    expect(luxText(10.7639, 'foot-candle')).toBe('1.0 fc');
    expect(luxText(0.9996, 'lux', 1)).toBe('0.9996 lx');
    expect(luxText(4.96, 'lux', 5)).toBe('4.96 lx');
  });
});

describe('a target', () => {
  it('is met without words', () => {
    expect(shortOf(path, { leastLux: path.least.lux, meanLux: 1, uniformity: 0.01 })).toEqual([]);
    expect(shortOf(path, { leastLux: null, meanLux: null, uniformity: null })).toEqual([]);
  });

  it('says what of it fails, and where', () => {
    const short = shortOf(path, { leastLux: 20, meanLux: 300, uniformity: 0.9 });
    expect(short).toHaveLength(3);
    expect(short[0]).toMatch(
      /^The darkest place, \d+\.\d m along the path, has \d+(\.\d+)? lx; at least 20 lx is wanted\.$/,
    );
    expect(short[1]).toMatch(/^The mean is \d+ lx; 300 lx is wanted\.$/);
    expect(short[2]).toMatch(/^It is uneven: the darkest place has 0\.\d+ of the mean; 0\.9 is wanted\.$/);
    expect(
      shortOf(path, { leastLux: 10.7639 * 3, meanLux: null, uniformity: null }, 'foot-candle')[0],
    ).toMatch(/fc; at least 3 fc is wanted/);
  });

  it('never says a figure that looks as if it met it', () => {
    const near = { leastLux: path.least.lux * 1.0001, meanLux: null, uniformity: null };
    const [sentence = ''] = shortOf(path, near);
    const [got, wanted] = [...sentence.matchAll(/(\d+(?:\.\d+)?) lx/g)].map((m) => Number(m[1]));
    expect(got).toBeLessThan(near.leastLux);
    expect(wanted).toBeGreaterThan(0);
  });

  it('is offered with whoever says so', () => {
    for (const { source } of usualTargets)
      expect(source).toMatch(/German public-lighting guidance|EN 12464-2/);
    // German public-lighting guidance: park paths at least 1 lx, with steps at least 5 lx.
    expect(usualTargets.slice(0, 2).map(({ target }) => target.leastLux)).toEqual([1, 5]);
    // After EN 12464-2: outdoor stairs 5 to 50 lx.
    expect(usualTargets.slice(2).map(({ target }) => target.leastLux)).toEqual([5, 50]);
  });

  it('has moonlight beside it', () => {
    // A full moon gives 0.05 to 0.3 lx (dark-sky guidance, from memory).
    expect(FULL_MOON_LUX).toEqual({ least: 0.05, most: 0.3 });
    expect([0.01, 0.2, 0.32, 3, 60].map(besideMoonlight)).toEqual([
      'less than a full moon gives',
      'about what a full moon gives',
      'a little more than a full moon gives',
      'about 10 times what a bright full moon gives',
      'about 200 times what a bright full moon gives',
    ]);
  });
});

describe('figures for export', () => {
  /** A reader of RFC 4180 of the test's own. */
  function read(text: string): string[][] {
    expect(text.endsWith('\r\n')).toBe(true);
    const rows: string[][] = [];
    let row: string[] = [];
    let field = '';
    let quoted = false;
    for (let i = 0; i < text.length; i++) {
      const c = text[i]!;
      if (quoted && c === '"' && text[i + 1] === '"') {
        field += '"';
        i += 1;
      } else if (c === '"') quoted = !quoted;
      else if (!quoted && c === ',') {
        row.push(field);
        field = '';
      } else if (!quoted && c === '\r' && text[i + 1] === '\n') {
        rows.push([...row, field]);
        row = [];
        field = '';
        i += 1;
      } else field += c;
    }
    return rows;
  }

  it('are CSV with units in the head, a line each, quoted where they must be', () => {
    const target = { leastLux: 5, meanLux: null, uniformity: null };
    const rows = read(
      figuresCsv(
        [
          { name: 'Front path, "the long one"\nwith steps', kind: 'path', figures: path, target },
          { name: '=HYPERLINK("x")', kind: 'area', figures: path, target: null },
        ],
        'lux',
      ),
    );
    expect(rows).toHaveLength(3);
    expect(new Set(rows.map((r) => r.length))).toEqual(new Set([13]));
    expect(rows[0]?.slice(0, 5)).toEqual(['name', 'kind', 'least (lx)', 'mean (lx)', 'most (lx)']);
    expect(rows[1]?.[0]).toBe('Front path, "the long one"\nwith steps');
    expect(Number(rows[1]?.[2])).toBeCloseTo(path.least.lux, 2);
    expect(rows[1]?.[11]).toBe(path.least.lux < 5 ? 'no' : 'yes');
    expect(rows[2]?.[0]).toBe('\'=HYPERLINK("x")');
    expect(rows[2]?.[11]).toBe('');
  });

  it('are every place of the grid with its light, in the chosen unit', () => {
    const rows = read(gridCsv(path, 'foot-candle'));
    expect(rows[0]).toEqual(['x (m)', 'y (m)', 'along the path (m)', 'illuminance (fc)']);
    expect(rows).toHaveLength(path.samples.length + 1);
    path.samples.forEach(({ lux }, i) => {
      expect(Number(rows[i + 1]?.[3])).toBeCloseTo(lux / LUX_PER_FOOT_CANDLE, 2);
    });
    const area = luxWithin(spaceWith({}), [
      { x: 0, y: 0 },
      { x: 1, y: 0 },
      { x: 1, y: 1 },
    ])!;
    expect(read(gridCsv(area, 'lux'))[0]).toEqual(['x (m)', 'y (m)', 'illuminance (lx)']);
    expect(read(gridCsv(area, 'lux'))[1]?.[2]).toBe('0');
  });
});
