import type { CatalogueItem } from '@lampwright/geometry/catalogue';
import styles from './catalogue.module.css';
import { describe } from './describe';

/** An item for those who may not change it. */
export function ItemFacts({ item }: { item: CatalogueItem }) {
  const { sort, figures, rating } = describe(item);
  return (
    <ul className={styles.facts}>
      {[sort, figures, rating, item.note ?? ''].filter(Boolean).map((line) => (
        <li key={line}>{line}</li>
      ))}
    </ul>
  );
}
