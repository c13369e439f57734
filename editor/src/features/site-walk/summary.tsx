import type { SiteWalk } from '../../lib/site-walk';
import styles from './summary.module.css';

type Row = readonly [label: string, value: string];

/** What was found, without what nobody has looked at. */
export function rowsOf(walk: SiteWalk, device: string): readonly Row[] {
  const rows: Row[] = [];
  const add = (label: string, value: string) => {
    if (value !== '') rows.push([label, value]);
  };
  if (walk.lineVoltsUnderLoad !== null) add('Line volts under load', `${walk.lineVoltsUnderLoad} V`);
  add('Outlet', walk.outletLocation);
  if (walk.circuitRatingAmps !== null) add('Circuit', `${walk.circuitRatingAmps} A`);
  add('Also on the circuit', walk.otherLoadsOnCircuit);
  if (walk.protected !== 'unknown') add(device, walk.protected === 'yes' ? 'Yes' : 'No');
  add('Existing transformer', walk.existingTransformer);
  add('Existing cable', walk.existingCable);
  const buried = [
    ['Irrigation', walk.irrigation],
    ['Private gas line', walk.gas],
    ['Pet fence', walk.petFence],
  ] as const;
  for (const [label, { present, note }] of buried) {
    if (present === 'yes') add(label, note === '' ? 'Yes' : note);
    else if (present === 'no') add(label, 'No');
  }
  add('Association rules', walk.associationRules);
  add('Permits', walk.permits);
  add('Notes', walk.notes);
  return rows;
}

/** Buried lines that nobody has asked about yet: worth saying before anybody digs. */
export function notAsked({ irrigation, gas, petFence }: SiteWalk): readonly string[] {
  const lines = [
    ['irrigation', irrigation],
    ['gas', gas],
    ['pet fence', petFence],
  ] as const;
  return lines.flatMap(([name, { present }]) => (present === 'unknown' ? [name] : []));
}

export function SiteWalkSummary({ walk, device }: { walk: SiteWalk; device: string }) {
  const rows = rowsOf(walk, device);
  const open = notAsked(walk);
  return (
    <>
      {rows.length > 0 && (
        <dl className={styles.rows}>
          {rows.map(([label, value]) => (
            <div key={label}>
              <dt>{label}</dt>
              <dd>{value}</dd>
            </div>
          ))}
        </dl>
      )}
      {open.length > 0 && (
        <p className={styles.open}>Private lines not asked about yet: {open.join(', ')}.</p>
      )}
    </>
  );
}
