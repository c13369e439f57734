import { formatLength, meters } from '@lampwright/geometry/units';
import { moneyOf } from '../../lib/money';
import type { Differences } from './api';
import styles from './proposal.module.css';
import { signed } from './sums';

interface DifferencesProps {
  readonly differences: Differences;
  readonly units: 'imperial' | 'metric';
  readonly currency: string;
  readonly locale: string;
}

export interface Told {
  readonly key: string;
  readonly what: string;
}

/** Every light that is other than before, a sentence each. */
export function told(
  { added, removed, moved, replaced }: Differences,
  units: DifferencesProps['units'],
): Told[] {
  const far = (m: number) => formatLength(meters(m), { system: units, precision: 'half-inch' });
  return [
    ...added.map(({ recordId, tag, name }) => ({ key: `added ${recordId}`, what: `${tag} added: ${name}` })),
    ...removed.map(({ recordId, tag, name }) => ({
      key: `removed ${recordId}`,
      what: `${tag} removed: ${name}`,
    })),
    ...replaced.map(({ recordId, tag, was, now }) => ({
      key: `replaced ${recordId}`,
      what: `${tag}: ${now} in place of ${was}`,
    })),
    ...moved.map((light) => ({
      key: `moved ${light.recordId}`,
      what: light.meters === null ? `${light.tag} moved` : `${light.tag} moved by ${far(light.meters)}`,
    })),
  ];
}

/** What is other than before: lights, lines and the total. */
export function DifferencesList({ differences, units, currency, locale }: DifferencesProps) {
  const money = moneyOf({ currency, locale });
  const lights = told(differences, units);
  const by = differences.nowTotalMinor - differences.wasTotalMinor;
  return (
    <>
      {lights.length + differences.lines.length === 0 && by === 0 && (
        <p className="quiet">Lights and prices are the same.</p>
      )}
      {lights.length > 0 && (
        <ul className={styles.told}>
          {lights.map(({ key, what }) => (
            <li key={key}>{what}</li>
          ))}
        </ul>
      )}
      {differences.lines.length > 0 && (
        <table className={styles.sums}>
          <caption className="visually-hidden">Lines that changed</caption>
          <thead>
            <tr>
              <th scope="col">Line</th>
              <th scope="col" className="figure">
                Was
              </th>
              <th scope="col" className="figure">
                Is
              </th>
              <th scope="col" className="figure">
                Difference
              </th>
            </tr>
          </thead>
          <tbody>
            {differences.lines.map((line) => (
              <tr key={`${line.name} ${line.unit} ${line.wasQuantity} ${line.nowQuantity}`}>
                <th scope="row">{line.name}</th>
                <td className="figure">{quantity(line.wasQuantity, line.unit, locale)}</td>
                <td className="figure">{quantity(line.nowQuantity, line.unit, locale)}</td>
                <td className="figure">{line.byMinor === null ? '–' : signed(line.byMinor, money)}</td>
              </tr>
            ))}
          </tbody>
        </table>
      )}
      <p>
        {by === 0 ? (
          <>
            Total <strong>{money(differences.nowTotalMinor)}</strong>, as before
          </>
        ) : (
          <>
            Total {money(differences.wasTotalMinor)} → <strong>{money(differences.nowTotalMinor)}</strong> (
            {signed(by, money)})
          </>
        )}
      </p>
    </>
  );
}

const shortUnit: Readonly<Record<string, string>> = { foot: ' ft', meter: ' m' };
const quantity = (n: number, unit: string, locale: string): string =>
  `${n.toLocaleString(locale)}${shortUnit[unit] ?? ''}`;
