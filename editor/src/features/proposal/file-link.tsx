import type { ReactNode } from 'react';
import styles from './proposal.module.css';

/** Leads to a file of the server, in a tab of its own so that the screen stays. */
export const FileLink = ({ href, children }: { readonly href: string; readonly children: ReactNode }) => (
  <a className={styles.file} href={href} target="_blank" rel="noreferrer">
    {children}
    <span className="visually-hidden"> (opens in a new tab)</span>
  </a>
);
