import type { FaultSeverity, PlanFault } from '@lampwright/geometry/estimate';
import { useEditor } from './context';
import { PanelFrame } from './PanelFrame';
import styles from './page.module.css';

const heads: Readonly<Record<FaultSeverity, string>> = {
  fault: 'Faults',
  caution: 'Cautions',
  advice: 'Advice',
};
const order: readonly FaultSeverity[] = ['fault', 'caution', 'advice'];

export function FaultList({ faults }: { readonly faults: readonly PlanFault[] }) {
  const editor = useEditor();
  return (
    <PanelFrame title={faults.some((f) => f.severity === 'fault') ? 'What stands in the way' : 'No faults'}>
      {faults.length === 0 && <p className={styles.calm}>Every fixture that is wired sits in its window.</p>}
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
    </PanelFrame>
  );
}
