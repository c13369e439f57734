import { Link } from 'react-router-dom';
import { Table } from '../../components/table';
import type { CatalogueEntry } from './api';
import styles from './catalogue.module.css';
import { describe } from './describe';

interface ItemTableProps {
  readonly entries: readonly CatalogueEntry[];
  readonly label: string;
  /** Where an item's name leads. */
  readonly hrefOf: (itemId: string) => string;
}

export function ItemTable({ entries, label, hrefOf }: ItemTableProps) {
  return (
    <Table label={label}>
      <thead>
        <tr>
          <th scope="col">Name</th>
          <th scope="col" className={styles.wide}>
            Kind
          </th>
          <th scope="col" className={styles.wide}>
            Figures
          </th>
          <th scope="col" data-align="end">
            Rating
          </th>
        </tr>
      </thead>
      <tbody>
        {entries.map(({ id, item }) => {
          const { sort, figures, rating } = describe(item);
          return (
            <tr key={id} className={styles.row}>
              <td>
                <Link to={hrefOf(id)} className={styles.name}>
                  {item.name}
                </Link>
                <div className={styles.below}>{[sort, figures].filter(Boolean).join(' · ')}</div>
              </td>
              <td className={styles.wide}>{sort}</td>
              <td className={styles.wide}>{figures}</td>
              <td data-align="end" className={styles.rating}>
                {rating}
              </td>
            </tr>
          );
        })}
      </tbody>
    </Table>
  );
}
