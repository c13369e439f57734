import type { ComponentProps } from 'react';
import styles from './select.module.css';

/** The browser's own select, drawn like the other fields; phones show their own list for it. */
export function Select(props: Omit<ComponentProps<'select'>, 'className'>) {
  return (
    <span className={styles.wrap}>
      <select {...props} className={styles.select} />
      <svg viewBox="0 0 12 12" width="12" height="12" className={styles.arrow} aria-hidden="true">
        <path d="M2.5 4.5 6 8l3.5-3.5" fill="none" stroke="currentColor" strokeWidth="1.6" />
      </svg>
    </span>
  );
}
