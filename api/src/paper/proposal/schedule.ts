import { recordOf } from '@lampwright/geometry/plan';
import { scheduleOf } from '@lampwright/geometry/price';
import type { ShownLight } from '../../modules/proposals/revision-document.js';
import { shortTag } from '../drawing/sheet-content.js';
import { type Column, drawTable, type Row } from '../table.js';
import { heading, QUIET, section, type Writing } from './parts.js';

const DASH = '–';

const LIGHT_COLUMNS: readonly Column[] = [
  { title: 'Tag', width: 58 },
  { title: 'Fixture' },
  { title: 'Quantity', width: 42, align: 'right' },
  { title: 'Watts each', width: 38, align: 'right' },
  { title: 'Lumens each', width: 42, align: 'right' },
  { title: 'Beam', width: 34, align: 'right' },
  { title: 'Light colour', width: 42, align: 'right' },
];
const LAMP_COLUMNS: readonly Column[] = [{ title: 'Lamp' }, { title: 'Quantity', width: 60, align: 'right' }];

/** Every light of the plan: what is included first, then what is offered apart. */
export function schedule(writing: Writing): void {
  const { paper, document, taken } = writing;
  section(paper, 'Schedule of fixtures and lamps');
  const lamps = new Map(scheduleOf(writing.plan).map(({ recordId, lamp }) => [recordId, lamp]));
  const included = document.lights.filter(({ groupId }) => groupId === null || taken.has(groupId));
  const rest = document.lights.filter(({ groupId }) => groupId !== null && !taken.has(groupId));
  if (document.lights.length === 0) paper.flow('There are no lights on this plan.', QUIET);
  lightTable(writing, included);
  if (rest.length > 0) {
    heading(paper, 'Offered as additions, not included');
    lightTable(writing, rest);
  }
  lampTable(writing, included, lamps);
}

function lightTable(writing: Writing, lights: readonly ShownLight[]): void {
  if (lights.length === 0) return;
  const { paper, say, plan } = writing;
  const rows: Row[] = lights.map((light) => {
    const { watts, lumens, beamDegrees, cctKelvin } = light.technical;
    const short = shortTag(plan, light);
    // What the designer called it; the stock phrase of its kind would only repeat itself down the page.
    const called = recordOf(plan, light.recordId, 'fixture')?.name ?? '';
    const figure = (value: number | null, unit: string) =>
      value === null ? DASH : `${say.number(value)}${unit}`;
    return {
      cells: [
        short,
        light.name,
        say.number(light.quantity),
        figure(watts, '\u00a0W'),
        figure(lumens, '\u00a0lm'),
        figure(beamDegrees, '°'),
        figure(cctKelvin, '\u00a0K'),
      ],
      below: [short === light.tag ? '' : light.tag, called === light.tag ? '' : called],
    };
  });
  const count = lights.reduce((sum, { quantity }) => sum + quantity, 0);
  const watts = lights.reduce((sum, light) => sum + light.quantity * (light.technical.watts ?? 0), 0);
  rows.push({
    cells: ['', 'Together', say.number(count), `${say.number(Math.round(watts * 10) / 10)}\u00a0W`],
    strong: true,
  });
  drawTable(paper, LIGHT_COLUMNS, rows);
}

/** Lamps that come in the fixtures included, by kind, for whoever changes one later. */
function lampTable(
  writing: Writing,
  lights: readonly ShownLight[],
  lamps: ReadonlyMap<string, string>,
): void {
  const counts = new Map<string, number>();
  for (const { recordId, quantity } of lights) {
    const lamp = lamps.get(recordId) ?? '';
    if (lamp !== '') counts.set(lamp, (counts.get(lamp) ?? 0) + quantity);
  }
  if (counts.size === 0) return;
  heading(writing.paper, 'Lamps');
  drawTable(
    writing.paper,
    LAMP_COLUMNS,
    [...counts].map(([lamp, count]) => ({ cells: [lamp, writing.say.number(count)] })),
  );
}
