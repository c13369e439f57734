import { estimateCaution } from '@lampwright/geometry/cautions';
import type { FaultSeverity } from '@lampwright/geometry/estimate';
import { useEditor } from './context';
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
                    {fault.message}
                  </button>
                </li>
              ))}
            </ul>
          </section>
        );
      })}
      <p className={styles.quiet}>{estimateCaution}</p>
    </PanelFrame>
  );
}
