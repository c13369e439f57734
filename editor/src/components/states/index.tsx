import type { ReactNode } from 'react';
import { ApiProblem, sentenceOf } from '../../lib/api/client';
import { Button } from '../button';
import styles from './states.module.css';

interface EmptyProps {
  readonly title: string;
  /** What to do next. */
  readonly children: ReactNode;
  /** The button that does it. */
  readonly action?: ReactNode;
}

export function Empty({ title, children, action }: EmptyProps) {
  return (
    <div className={styles.empty}>
      <h2>{title}</h2>
      <p>{children}</p>
      {action && <div className={styles.emptyActions}>{action}</div>}
    </div>
  );
}

/** Asking again would be answered the same. */
const isFinal = (error: unknown): boolean =>
  error instanceof ApiProblem && [403, 404, 410].includes(error.status);

/** An error where its content would be, with a way to try again. */
export function Problem({ error, onRetry }: { error: unknown; onRetry?: () => void }) {
  return (
    <div className={styles.problem} role="alert">
      <p>{typeof error === 'string' ? error : sentenceOf(error)}</p>
      {onRetry && !isFinal(error) && <Button onClick={onRetry}>Try again</Button>}
    </div>
  );
}

/** Something went well, and what comes of it. */
export function Note({ children }: { children: ReactNode }) {
  return (
    <div className={styles.note} role="status">
      {children}
    </div>
  );
}

/** The outline of rows to come. */
export function SkeletonRows({ rows = 6, label }: { rows?: number; label: string }) {
  return (
    <div className={styles.rows} role="status" aria-label={label}>
      {Array.from({ length: rows }, (_, i) => (
        <div className={styles.row} key={i}>
          <span className={styles.bone} style={{ width: `${34 - ((i * 7) % 13)}%` }} />
          <span className={styles.bone} style={{ width: `${18 + ((i * 5) % 9)}%` }} />
          <span className={styles.bone} style={{ width: '12%', marginInlineStart: 'auto' }} />
        </div>
      ))}
    </div>
  );
}
