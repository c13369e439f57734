import { useId } from 'react';
import { Select } from '../../components/select';
import { Table as TableFrame } from '../../components/table';
import type { DefaultCategory, FieldName, Mapping, Table } from './api';
import styles from './import.module.css';
import { fieldOfColumn, samplesOf, withField } from './mapping';

interface ColumnsProps {
  readonly table: Table;
  readonly mapping: Mapping;
  readonly onMapping: (mapping: Mapping) => void;
  readonly category: DefaultCategory | null;
  readonly onCategory: (category: DefaultCategory | null) => void;
  readonly categories: readonly { readonly value: DefaultCategory; readonly label: string }[];
}

/** The second step: what each column holds. */
export function Columns({ table, mapping, onMapping, category, onCategory, categories }: ColumnsProps) {
  const categoryId = useId();
  const fields = table.fields.filter(({ money }) => table.pricesTaken || !money);
  return (
    <>
      {!table.pricesTaken && (
        <p className={styles.note}>
          Columns of cost, price and supplier are left out: your role does not see what things cost.
        </p>
      )}
      {mapping.name === null && mapping.id === null && mapping.orderNumber === null && (
        <p className={styles.note}>No column is taken as the name yet: say which one holds it.</p>
      )}
      <TableFrame label="Columns of the table">
        <thead>
          <tr>
            <th scope="col">Column</th>
            <th scope="col" className={styles.samples}>
              Holds, for example
            </th>
            <th scope="col" className={styles.taken}>
              Is taken as
            </th>
          </tr>
        </thead>
        <tbody>
          {table.columns.map((head, column) => (
            // A column is known by its place: heads may repeat.
            <tr key={column}>
              <th scope="row" className={styles.head}>
                {head || `Column ${column + 1}`}
                <span className={styles.samplesBelow}>{samplesOf(table, column).join(' · ')}</span>
              </th>
              <td className={styles.samples}>{samplesOf(table, column).join(' · ')}</td>
              <td>
                <Select
                  aria-label={`What ${head || `column ${column + 1}`} holds`}
                  value={fieldOfColumn(mapping, column) ?? ''}
                  onChange={({ target }) =>
                    onMapping(
                      withField(mapping, column, target.value === '' ? null : (target.value as FieldName)),
                    )
                  }
                >
                  <option value="">Leave out</option>
                  {fields.map(({ name, header }) => (
                    <option key={name} value={name}>
                      {header}
                    </option>
                  ))}
                </Select>
              </td>
            </tr>
          ))}
        </tbody>
      </TableFrame>
      <p className={styles.category}>
        <label htmlFor={categoryId}>Rows that do not say their category are</label>
        <Select
          id={categoryId}
          value={category ?? ''}
          onChange={({ target }) =>
            onCategory(target.value === '' ? null : (target.value as DefaultCategory))
          }
        >
          <option value="">items that the catalogue has already</option>
          {categories.map(({ value, label }) => (
            <option key={value} value={value}>
              {label.toLowerCase()}
            </option>
          ))}
        </Select>
      </p>
    </>
  );
}
