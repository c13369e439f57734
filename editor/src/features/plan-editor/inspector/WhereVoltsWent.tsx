import { type VoltsWhy, whyOf } from '@lampwright/geometry/estimate';
import { type FixtureRecord, type PlanDocument, recordOf } from '@lampwright/geometry/plan';
import { useMemo } from 'react';
import { tagOf } from '../../../plan-view/names';
import { ampsText } from '../../../plan-view/words';
import { useDoc, useEditor, useEstimate, useSession } from '../page/context';
import styles from './where-volts-went.module.css';

/** Two decimals: what one length of cable loses is often less than a tenth of a volt. */
const voltsLost = (volts: number): string => `${(volts < 0 ? -volts : volts).toFixed(2)} V`;

/** Of one fixture: where its volts went, from the tap by each length of cable to the lamp. */
export function WhereVoltsWent({ fixture }: { readonly fixture: FixtureRecord }) {
  const doc = useDoc();
  const editor = useEditor();
  const answer = useEstimate((s) => s.answer);
  const request = useEstimate((s) => s.plan?.request ?? null);
  const stale = useEstimate((s) => s.stale);
  const hoveredId = useSession((s) => s.hoveredId);
  const why = useMemo(
    () => (request === null || answer === null ? null : whyOf(request, answer, fixture.id)),
    [request, answer, fixture.id],
  );
  if (why === null || stale) return null;
  const cables = why.segments.map(({ cableId }) => cableId);
  return (
    <details className={styles.why}>
      <summary>Where its volts went</summary>
      <table>
        <thead>
          <tr>
            <th scope="col">On the way</th>
            <th scope="col">Amps</th>
            <th scope="col">Lost</th>
          </tr>
        </thead>
        <tbody>
          <tr>
            <th scope="row">Tap without load</th>
            <td />
            <td>{why.openVolts.toFixed(2)} V</td>
          </tr>
          {why.sagVolts > 0 && (
            <tr>
              <th scope="row">The transformer’s own sag</th>
              <td />
              <td>−{voltsLost(why.sagVolts)}</td>
            </tr>
          )}
          {why.segments.map(({ cableId, amps, dropVolts }) => (
            <tr
              key={cableId}
              data-lit={hoveredId === cableId || undefined}
              onPointerEnter={() => editor.hover(cableId)}
              onPointerLeave={() => editor.hover(null)}
            >
              <th scope="row">
                <button
                  type="button"
                  onFocus={() => editor.hover(cableId)}
                  onBlur={() => editor.hover(null)}
                  onClick={() => editor.reveal(cableId)}
                >
                  {endsInWords(doc, cableId)}
                </button>
              </th>
              <td>{ampsText(amps)}</td>
              <td>
                {dropVolts < 0 ? '+' : '−'}
                {voltsLost(dropVolts)}
              </td>
            </tr>
          ))}
          <tr>
            <th scope="row">Its own lead</th>
            <td />
            <td>−{voltsLost(why.leadVolts)}</td>
          </tr>
        </tbody>
        <tfoot>
          <tr>
            <th scope="row">At the lamp</th>
            <td />
            <td>{why.volts.toFixed(2)} V</td>
          </tr>
        </tfoot>
      </table>
      <p className={styles.most}>{mostInWords(doc, why)}</p>
      {cables.length > 0 && (
        <button type="button" className={styles.all} onClick={() => editor.select(cables)}>
          Choose all cable on the way
        </button>
      )}
    </details>
  );
}

function endsInWords(doc: PlanDocument, cableId: string): string {
  const cable = recordOf(doc, cableId, 'cable');
  const tag = (id: string | undefined) => {
    const end = id === undefined ? undefined : doc.get(id);
    return end === undefined ? '?' : tagOf(doc, end);
  };
  return `${tag(cable?.fromId)} to ${tag(cable?.toId)}`;
}

/** Which length takes the most, and of how much. */
function mostInWords(doc: PlanDocument, { segments, openVolts, volts }: VoltsWhy): string {
  const [most] = [...segments].sort((a, b) => b.dropVolts - a.dropVolts);
  const lost = openVolts - volts;
  if (most === undefined || lost <= 0) return '';
  const share = Math.round((most.dropVolts / lost) * 100);
  return `${endsInWords(doc, most.cableId)} takes the most: ${share} % of ${voltsLost(lost)}.`;
}
