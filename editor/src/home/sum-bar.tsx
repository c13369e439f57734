import { HowToReach } from './contact';
import type { Combination, ShareDocument } from './share';
import styles from './sum-bar.module.css';
import { moneyOf } from './words';

interface Props {
  readonly document: ShareDocument;
  /** Undefined where nothing can be had. */
  readonly sums: Combination | undefined;
  readonly onReview: () => void;
}

export const REVIEW_BUTTON = 'review-and-approve';

/** The sum and the one button that moves things on, always in sight. */
export function SumBar({ document, sums, onReview }: Props) {
  const money = moneyOf(document);
  if (!sums?.offerable)
    return (
      <div className={styles.bar}>
        <p>
          This can’t be approved as it is. Please <HowToReach company={document.company} />.
        </p>
      </div>
    );
  const [stage] = sums.stages;
  return (
    <div className={styles.bar}>
      <p className={styles.sum}>
        <strong>{money(sums.totalMinor)}</strong>
        {stage && sums.stages.length > 1 && stage.due === 'approval' && (
          <small>
            {stage.name} {money(stage.amountMinor)}
          </small>
        )}
      </p>
      <button id={REVIEW_BUTTON} type="button" className="lamp-button" onClick={onReview}>
        Review and approve
      </button>
    </div>
  );
}
