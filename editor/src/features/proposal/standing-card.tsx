import type { ReactNode } from 'react';
import { Link } from 'react-router-dom';
import { CheckIcon, CloseIcon } from '../../components/icons';
import { proposalWord } from '../../lib/proposal-states';
import type { Obstacle, Proposal } from './api';
import styles from './proposal.module.css';
import { mendWord, sentenceOfState, stepsOf } from './standing';

interface StandingProps {
  readonly proposal: Proposal;
  /** What has changed since; null where nothing has. */
  readonly changed: string | null;
  readonly obstacles: readonly Obstacle[];
  /** Where an obstacle is mended. */
  readonly mendAt: (mend: Obstacle['mend']) => string;
  /** The button that moves the job on, or what is going on instead. */
  readonly move: ReactNode;
}

/** How the proposal stands at a glance: in words, as a line of steps, and what comes next. */
export function StandingCard({ proposal, changed, obstacles, mendAt, move }: StandingProps) {
  return (
    <section className={styles.standing} aria-label="How it stands">
      <div className={styles.standingText}>
        <p className={styles.state}>{proposalWord(proposal.state)}</p>
        <p>{sentenceOfState(proposal, new Date().toISOString())}</p>
        {changed !== null && <p className={styles.changed}>{changed}</p>}
      </div>
      <ol className={styles.steps} aria-label="Steps">
        {stepsOf(proposal).map(({ station, label, is }) => (
          <li key={station} data-is={is} aria-current={is === 'now' ? 'step' : undefined}>
            <span className={styles.mark} aria-hidden="true">
              {is === 'done' && <CheckIcon />}
              {is === 'ended' && <CloseIcon />}
            </span>
            {label}
            <span className="visually-hidden">
              {is === 'done' ? ', done' : is === 'ahead' ? ', ahead' : ''}
            </span>
          </li>
        ))}
      </ol>
      {obstacles.length > 0 && (
        <div className={styles.obstacles}>
          <h2>What stands in the way</h2>
          <ul>
            {obstacles.map(({ message, mend }) => (
              <li key={message}>
                {message} <Link to={mendAt(mend)}>{mendWord(mend)}</Link>
              </li>
            ))}
          </ul>
        </div>
      )}
      {move}
    </section>
  );
}

/** A revision on its way to becoming paper. */
export function Preparing({ progress, label }: { readonly progress: number; readonly label: string }) {
  return (
    <div className={styles.preparing} role="status">
      <span>
        {label} <span className="quiet">{progress} %</span>
      </span>
      <progress max={100} value={progress} aria-label={label} />
    </div>
  );
}
