import type { FaultSeverity, PlanFault } from '@lampwright/geometry/estimate';
import { labelOf, type PlanDocument } from '@lampwright/geometry/plan';
import { tagOf } from '../../../plan-view/names';
import { useDoc, useEditor } from './context';
import { PanelFrame } from './PanelFrame';
import styles from './page.module.css';
import type { Faults } from './use-faults';

const heads: Readonly<Record<FaultSeverity, string>> = {
  fault: 'Faults',
  caution: 'Cautions',
  advice: 'Advice',
};
const order: readonly FaultSeverity[] = ['fault', 'caution', 'advice'];

export function FaultList({ faults: { list: faults, voltsKnown } }: { readonly faults: Faults }) {
  const editor = useEditor();
  const doc = useDoc();
  return (
    <PanelFrame
      title={
        faults.some((f) => f.severity === 'fault')
          ? 'What stands in the way'
          : voltsKnown
            ? 'No faults'
            : 'Volts not known yet'
      }
    >
      {faults.length === 0 && (
        <p className={styles.calm}>
          {voltsKnown
            ? 'Every fixture that is wired sits in its window.'
            : 'The volts are not known yet, so nothing can be said of them.'}
        </p>
      )}
      {order.map((severity) => {
        const some = faults.filter((f) => f.severity === severity);
        if (some.length === 0) return null;
        return (
          <section key={severity}>
            <h3>
              {heads[severity]} · {some.length}
            </h3>
            <ul className={styles.faults}>
              {some.map((fault) => (
                <li key={`${fault.code}${fault.recordId}${fault.otherId ?? ''}`}>
                  <button type="button" onClick={() => editor.reveal(fault.recordId)}>
                    {withTag(doc, fault)}
                  </button>
                </li>
              ))}
            </ul>
          </section>
        );
      })}
    </PanelFrame>
  );
}

/** The message in the words of the drawing: a nameless fixture goes by its tag there, P6 and not fixture 6. */
export function withTag(doc: PlanDocument, { recordId, message }: PlanFault): string {
  const record = doc.get(recordId);
  if (record?.kind !== 'fixture' || record.name !== '') return message;
  const label = labelOf(record);
  const capital = label.charAt(0).toUpperCase() + label.slice(1);
  return message.startsWith(`${capital} `)
    ? `${tagOf(doc, record)}${message.slice(capital.length)}`
    : message;
}
