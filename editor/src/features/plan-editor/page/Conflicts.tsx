import type { ConflictChoice, PlanConflict, PlanRecord } from '@lampwright/geometry/plan';
import { Button } from '../../../components/button';
import { tagOf } from '../../../plan-view/names';
import { useDoc, useEditor, usePlan } from './context';
import { describeName, describeRecord } from './describe';
import { PanelFrame } from './PanelFrame';
import styles from './page.module.css';

/** Records that somebody else changed at the same time: both are shown, one is chosen, nothing is lost unseen. */
export function Conflicts() {
  const editor = useEditor();
  const conflicts = usePlan((s) => s.conflicts);
  const choices = usePlan((s) => s.choices);
  return (
    <PanelFrame title="Changed by two people">
      {conflicts.length === 0 ? (
        <p className={styles.calm}>All is settled and saved.</p>
      ) : (
        <>
          <p>
            Somebody else changed {conflicts.length === 1 ? 'this' : 'these'} while you did. Choose which
            stays; your other work is safe meanwhile.
          </p>
          <ul className={styles.conflicts}>
            {conflicts.map((conflict) => (
              <li key={conflict.recordId}>
                <Conflict
                  conflict={conflict}
                  choice={choices.get(conflict.recordId) ?? null}
                  choose={(choice) => editor.plan.resolve(conflict.recordId, choice)}
                />
              </li>
            ))}
          </ul>
        </>
      )}
    </PanelFrame>
  );
}

interface ConflictProps {
  readonly conflict: PlanConflict;
  readonly choice: ConflictChoice | null;
  readonly choose: (choice: ConflictChoice) => void;
}

function Conflict({ conflict, choice, choose }: ConflictProps) {
  const doc = useDoc();
  const record = conflict.mine ?? conflict.theirs ?? conflict.base;
  const name = record === null ? 'Something removed' : `${tagOf(doc, record)} ${describeName(record)}`.trim();
  const side = (label: string, which: ConflictChoice, value: PlanRecord | null) => (
    <div className={styles.side}>
      <h4>{label}</h4>
      <p>{value === null ? 'Removed' : describeRecord(value, conflict.base).join(' · ') || 'As it was'}</p>
      <Button
        aria-pressed={choice === which}
        kind={choice === which ? 'strong' : 'quiet'}
        onClick={() => choose(which)}
      >
        Keep {which === 'mine' ? 'mine' : 'theirs'}
      </Button>
    </div>
  );
  return (
    <section aria-label={name}>
      <h3>{name}</h3>
      <p className={styles.quiet}>{conflict.message}</p>
      <div className={styles.sides}>
        {side('Mine', 'mine', conflict.mine)}
        {side('Theirs', 'theirs', conflict.theirs)}
      </div>
    </section>
  );
}
