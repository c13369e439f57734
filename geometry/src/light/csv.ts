import type { LightTarget } from '../plan/index.js';
import type { LuxFigures } from './grid.js';
import { inLuxUnit, type LuxUnit, luxUnitText, shortOf } from './target.js';

/** The light of one measured path or area, as it is exported. */
export interface LuxRow {
  readonly name: string;
  readonly kind: 'path' | 'area';
  readonly figures: LuxFigures;
  readonly target: LightTarget | null;
}

/** Figures of paths and areas, a line each. RFC 4180, with units in the head; numbers have a point and are unrounded to 4 digits. */
export function figuresCsv(rows: readonly LuxRow[], unit: LuxUnit): string {
  const u = luxUnitText(unit);
  const light = (lux: number | null | undefined) => (lux == null ? '' : digits(inLuxUnit(lux, unit)));
  return csv([
    [
      'name',
      'kind',
      `least (${u})`,
      `mean (${u})`,
      `most (${u})`,
      'uniformity (least / mean)',
      'sample spacing (m)',
      'samples',
      `wanted least (${u})`,
      `wanted mean (${u})`,
      'wanted uniformity',
      'target met',
      'remarks',
    ],
    ...rows.map(({ name, kind, figures, target }) => {
      const short = target ? shortOf(figures, target, unit) : [];
      return [
        guarded(name),
        kind,
        light(figures.least.lux),
        light(figures.meanLux),
        light(figures.most.lux),
        digits(figures.uniformity),
        digits(figures.spacingMeters),
        String(figures.samples.length),
        light(target?.leastLux),
        light(target?.meanLux),
        target?.uniformity == null ? '' : digits(target.uniformity),
        target ? (short.length === 0 ? 'yes' : 'no') : '',
        [...short, ...figures.notes].join(' '),
      ];
    }),
  ]);
}

/** Every sample of one path or area: where it is on the ground, and its light. RFC 4180, with units in the head. */
export function gridCsv({ samples }: LuxFigures, unit: LuxUnit): string {
  const along = samples.some(({ alongMeters }) => alongMeters !== null);
  return csv([
    ['x (m)', 'y (m)', ...(along ? ['along the path (m)'] : []), `illuminance (${luxUnitText(unit)})`],
    ...samples.map(({ x, y, alongMeters, lux }) => [
      x.toFixed(3),
      y.toFixed(3),
      ...(along ? [alongMeters === null ? '' : alongMeters.toFixed(3)] : []),
      digits(inLuxUnit(lux, unit)),
    ]),
  ]);
}

/** Four digits that mean something, never in powers of ten. */
function digits(value: number): string {
  if (value === 0) return '0';
  const places = Math.min(Math.max(3 - Math.floor(Math.log10(Math.abs(value))), 0), 8);
  const text = value.toFixed(places);
  return text.includes('.') ? text.replace(/\.?0+$/, '') : text;
}

function csv(rows: readonly (readonly string[])[]): string {
  return rows.map((row) => `${row.map(cell).join(',')}\r\n`).join('');
}

/** RFC 4180: what holds a comma, a quote or a line's end is quoted, and quotes in it are doubled. */
function cell(text: string): string {
  return /[",\r\n]/.test(text) ? `"${text.replaceAll('"', '""')}"` : text;
}

/** A spreadsheet takes a text that begins like this for a formula, and runs it. */
function guarded(text: string): string {
  return /^\s*[=+\-@]|^[\t\r\n]/.test(text) ? `'${text}` : text;
}
