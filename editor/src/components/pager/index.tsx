import { Button } from '../button';
import { ChevronLeft, ChevronRight } from '../icons';
import styles from './pager.module.css';

interface PagerProps {
  readonly page: number;
  readonly pageSize: number;
  readonly total: number;
  /** What is counted: "jobs". */
  readonly noun: string;
  readonly onPage: (page: number) => void;
}

export function Pager({ page, pageSize, total, noun, onPage }: PagerProps) {
  const pages = Math.max(1, Math.ceil(total / pageSize));
  const first = total === 0 ? 0 : (page - 1) * pageSize + 1;
  const last = Math.min(total, page * pageSize);
  return (
    <nav className={styles.pager} aria-label={`Pages of ${noun}`}>
      <span className="quiet" aria-live="polite">
        {pages === 1 ? `${total} ${noun}` : `${first} to ${last} of ${total} ${noun}`}
      </span>
      {pages > 1 && (
        <span className={styles.steps}>
          <Button icon aria-label="Previous page" disabled={page <= 1} onClick={() => onPage(page - 1)}>
            <ChevronLeft />
          </Button>
          <Button icon aria-label="Next page" disabled={page >= pages} onClick={() => onPage(page + 1)}>
            <ChevronRight />
          </Button>
        </span>
      )}
    </nav>
  );
}
