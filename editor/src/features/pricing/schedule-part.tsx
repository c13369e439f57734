import type { ScheduleRow } from '@lampwright/geometry/price';
import { Link } from 'react-router-dom';
import { Button } from '../../components/button';
import { Section } from '../../components/page';
import { Empty } from '../../components/states';
import { Table } from '../../components/table';
import { showProblem, showToast } from '../../components/toast';
import styles from './schedule.module.css';
import { kindLabel } from './words';

interface SchedulePartProps {
  readonly rows: readonly ScheduleRow[];
  readonly planHref: (recordIds: readonly string[]) => string;
}

const heads = [
  'Tag',
  'Kind',
  'Fixture',
  'Lamp',
  'Quantity',
  'Watts each',
  'Lumens',
  'Beam, °',
  'Colour, K',
] as const;

const cellsOf = (row: ScheduleRow): readonly (string | number)[] => [
  row.tag,
  row.kind === null ? '' : kindLabel(row.kind),
  row.fixture,
  row.lamp === '' ? 'built in' : row.lamp,
  row.quantity,
  row.watts ?? '',
  row.lumens ?? '',
  row.beamDegrees ?? '',
  row.cctKelvin ?? '',
];

/** The schedule as a table that spreadsheets and mails take: columns parted by tabs. */
export function scheduleText(rows: readonly ScheduleRow[]): string {
  // A tab or a line break within a name would begin another cell.
  const clean = (cell: string | number) => String(cell).replace(/\s+/g, ' ');
  return [heads, ...rows.map(cellsOf)].map((cells) => cells.map(clean).join('\t')).join('\n');
}

/** Fixtures and lamps by their tags, as the plan has them. */
export function SchedulePart({ rows, planHref }: SchedulePartProps) {
  const copy = () =>
    navigator.clipboard.writeText(scheduleText(rows)).then(
      () => void showToast({ message: 'The schedule is copied; paste it into a spreadsheet.' }),
      () =>
        void showProblem('This browser does not let the page copy. Select the table and copy it by hand.'),
    );
  if (rows.length === 0)
    return <Empty title="No fixtures yet">The schedule lists every fixture once it is on the plan.</Empty>;
  const lights = rows.reduce((sum, { quantity }) => sum + quantity, 0);
  const watts = rows.reduce((sum, row) => sum + (row.watts ?? 0) * row.quantity, 0);
  return (
    <div className={styles.schedule}>
      <Section
        title="Fixture and lamp schedule"
        actions={
          <span className={styles.actions}>
            <Button onClick={copy}>Copy</Button>
            <Button onClick={() => window.print()}>Print</Button>
          </span>
        }
      >
        <Table label="Fixtures and lamps">
          <thead>
            <tr>
              <th scope="col">Tag</th>
              <th scope="col">Fixture</th>
              <th scope="col" className={styles.wide}>
                Lamp
              </th>
              {['Qty', 'W', 'lm', 'Beam', 'K'].map((head) => (
                <th
                  key={head}
                  scope="col"
                  data-align="end"
                  className={head === 'Qty' ? undefined : styles.wide}
                >
                  {head}
                </th>
              ))}
            </tr>
          </thead>
          <tbody>
            {rows.map((row) => (
              <tr key={row.recordId} className={styles.row}>
                <td>
                  <Link to={planHref([row.recordId])}>{row.tag}</Link>
                </td>
                <td>
                  {row.fixture}
                  <span className={styles.narrow}>{narrowText(row)}</span>
                </td>
                <td className={styles.wide}>{row.lamp || <span className="quiet">built in</span>}</td>
                <td data-align="end">{row.quantity}</td>
                <td data-align="end" className={styles.wide}>
                  {row.watts ?? '–'}
                </td>
                <td data-align="end" className={styles.wide}>
                  {row.lumens ?? '–'}
                </td>
                <td data-align="end" className={styles.wide}>
                  {row.beamDegrees === null ? '–' : `${row.beamDegrees}°`}
                </td>
                <td data-align="end" className={styles.wide}>
                  {row.cctKelvin ?? '–'}
                </td>
              </tr>
            ))}
          </tbody>
          <tfoot>
            <tr className={styles.foot}>
              <th scope="row" colSpan={2}>
                All
              </th>
              <td className={styles.wide} />
              <td data-align="end">{lights}</td>
              <td data-align="end" className={styles.wide}>
                {Math.round(watts * 10) / 10}
              </td>
              <td className={styles.wide} colSpan={3} />
            </tr>
          </tfoot>
        </Table>
      </Section>
    </div>
  );
}

const narrowText = ({ lamp, watts, lumens, beamDegrees, cctKelvin }: ScheduleRow): string =>
  [
    lamp,
    watts === null ? '' : `${watts} W`,
    lumens === null ? '' : `${lumens} lm`,
    beamDegrees === null ? '' : `${beamDegrees}°`,
    cctKelvin === null ? '' : `${cctKelvin} K`,
  ]
    .filter((part) => part !== '')
    .join(' · ');
