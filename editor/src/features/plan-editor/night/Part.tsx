import { type ReactNode, useId } from 'react';
import styles from './light-panel.module.css';

interface PartProps {
  readonly title: string;
  /** A figure or a button at the end of the title's line. */
  readonly aside?: ReactNode;
  readonly children: ReactNode;
}

/** One subject of the light panel. */
export function Part({ title, aside, children }: PartProps) {
  const id = useId();
  return (
    <section className={styles.part} aria-labelledby={id}>
      <header className={styles.head}>
        <h3 id={id}>{title}</h3>
        {aside}
      </header>
      {children}
    </section>
  );
}
