import type { Numbers } from './api';
import { figuresOf } from './figures';
import styles from './numbers.module.css';

/** A few figures, each with a sentence of what it counts. */
export function Figures({ numbers, stale }: { readonly numbers: Numbers; readonly stale: boolean }) {
  return (
    <dl className={styles.figures} data-stale={stale ? '' : undefined}>
      {figuresOf(numbers).map(({ name, figure, sentence }) => (
        <div key={name}>
          <dt>{name}</dt>
          <dd className={styles.big}>{figure}</dd>
          <dd className={styles.sentence}>{sentence}</dd>
        </div>
      ))}
    </dl>
  );
}
