import { count } from '../../lib/format';
import styles from './plan-state.module.css';

interface PlanStateProps {
  readonly faults: number | null;
  readonly cautions: number | null;
  readonly fixtures: number | null;
}

/** How a plan stands, in words with a mark; the mark's hue says nothing that the words don't. */
export function PlanState({ faults, cautions, fixtures }: PlanStateProps) {
  if (fixtures === null || faults === null) return <span className="quiet">No plan yet</span>;
  if (fixtures === 0 && faults === 0) return <span className="quiet">No fixtures yet</span>;
  return (
    <span className={styles.state}>
      {faults > 0 ? (
        <span className={styles.line}>
          <Burst />
          {count(faults, 'fault')}
        </span>
      ) : (
        <span className={styles.line}>
          <Tick />
          No faults
        </span>
      )}
      <span className={styles.second}>{detail(fixtures, cautions)}</span>
    </span>
  );
}

const detail = (fixtures: number, cautions: number | null): string =>
  cautions === null || cautions === 0
    ? count(fixtures, 'fixture')
    : `${count(fixtures, 'fixture')} · ${count(cautions, 'caution')}`;

const Burst = () => (
  <svg viewBox="0 0 16 16" width="14" height="14" aria-hidden="true">
    <path
      d="M8 0l1.8 3.6L13.6 2.4l-1.2 3.8L16 8l-3.6 1.8 1.2 3.8-3.8-1.2L8 16l-1.8-3.6-3.8 1.2 1.2-3.8L0 8l3.6-1.8L2.4 2.4l3.8 1.2z"
      fill="var(--overdriven)"
    />
  </svg>
);

const Tick = () => (
  <svg viewBox="0 0 16 16" width="14" height="14" aria-hidden="true">
    <circle cx="8" cy="8" r="8" fill="var(--moss)" />
    <path d="M4.5 8.3 7 10.8l4.6-5" fill="none" stroke="var(--ground-raised)" strokeWidth="1.8" />
  </svg>
);
