import type { CatalogueItem } from '@lampwright/geometry/catalogue';
import styles from './catalogue.module.css';
import { describe, lightFacts } from './describe';

/** An item for those who may not change it. */
export function ItemFacts({ item }: { item: CatalogueItem }) {
  const { sort, figures, rating } = describe(item);
  return (
    <ul className={styles.facts}>
      {[sort, figures, rating, ...lightFacts(item), item.note ?? ''].filter(Boolean).map((line) => (
        <li key={line}>{line}</li>
      ))}
    </ul>
  );
}
