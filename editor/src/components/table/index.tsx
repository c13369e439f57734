import type { ReactNode } from 'react';
import styles from './table.module.css';

/** A plain table with real column heads; scrolls sideways in itself when the window is too narrow. */
export function Table({ label, children }: { label: string; children: ReactNode }) {
  return (
    <div className={styles.wrap}>
      <table className={styles.table} aria-label={label}>
        {children}
      </table>
    </div>
  );
}

export type Direction = 'asc' | 'desc';

interface SortHeadProps {
  readonly label: string;
  /** The direction when the table is sorted by this column, else null. */
  readonly sorted: Direction | null;
  readonly onSort: () => void;
  readonly className?: string;
}

/** A column head that sorts; says so to a screen reader as well. */
export function SortHead({ label, sorted, onSort, className }: SortHeadProps) {
  const ariaSort = sorted === null ? 'none' : sorted === 'asc' ? 'ascending' : 'descending';
  return (
    <th scope="col" aria-sort={ariaSort} className={className}>
      <button type="button" className={styles.sort} onClick={onSort}>
        {label}
        <svg viewBox="0 0 8 10" className={styles.arrow} aria-hidden="true">
          <path d={sorted === 'asc' ? 'M4 1 7.5 6h-7z' : 'M4 9 .5 4h7z'} fill="currentColor" />
        </svg>
      </button>
    </th>
  );
}
