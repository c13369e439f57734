import type { ReactNode } from 'react';
import { Mark } from '../../components/mark';
import { useDocumentTitle, useHeadingFocus } from '../../components/page';
import { Evening } from './evening';
import styles from './front.module.css';

interface FrontProps {
  readonly title: string;
  readonly lede?: ReactNode;
  readonly foot?: ReactNode;
  readonly children: ReactNode;
}

/** The pages before the sign-in: one column on paper, an evening beside it where there is room. */
export function Front({ title, lede, foot, children }: FrontProps) {
  useDocumentTitle(title);
  const heading = useHeadingFocus();
  return (
    <div className={styles.front}>
      <main className={styles.side}>
        <div className={styles.column}>
          <p className={styles.brand}>
            <Mark size={28} />
            Lampwright
          </p>
          <h1 ref={heading} tabIndex={-1}>
            {title}
          </h1>
          {lede && <p className={styles.lede}>{lede}</p>}
          <div className={styles.body}>{children}</div>
          {foot && <div className={styles.foot}>{foot}</div>}
        </div>
      </main>
      <Evening />
    </div>
  );
}
