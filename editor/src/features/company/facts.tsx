import { scheduleInWords } from '@lampwright/geometry/night';
import { formatLength, meters } from '@lampwright/geometry/units';
import { placeText } from '../../lib/place';
import { regions } from '../../lib/regions';
import { useUnits } from '../../lib/units';
import type { Company } from './api';
import styles from './company.module.css';

/** The same values for those who may not change them. */
export function CompanyFacts({ company }: { company: Company }) {
  const system = useUnits();
  const { settings } = company;
  const length = (value: number) => formatLength(meters(value), { system, precision: 'half-inch' });
  const rows: readonly (readonly [string, string])[] = [
    ['Where we work', regions.find(({ value }) => value === company.region)?.label ?? company.region],
    ['Line volts', `${settings.lineVolts} V`],
    ['Load a transformer to', `${settings.transformerTargetPercent} %`],
    ['Aim, LED', `${settings.aim.led.minVolts} to ${settings.aim.led.maxVolts} V`],
    ['Aim, halogen', `${settings.aim.halogen.minVolts} to ${settings.aim.halogen.maxVolts} V`],
    ['Slack at the transformer', length(settings.slackAtTransformerMeters)],
    ['Slack at each fixture', length(settings.slackAtFixtureMeters)],
    ['Slack at hubs and splices', length(settings.slackAtJunctionMeters)],
    ['Least distance from water', length(settings.waterClearanceMeters)],
    ['Lights are usually on', scheduleInWords(settings.schedule)],
    ['Time zone', settings.timeZone],
    ['Where the sun sets', settings.place ? placeText(settings.place) : 'Not written down'],
  ];
  return (
    <dl className={styles.facts}>
      {rows.map(([label, value]) => (
        <div key={label}>
          <dt>{label}</dt>
          <dd>{value}</dd>
        </div>
      ))}
    </dl>
  );
}
