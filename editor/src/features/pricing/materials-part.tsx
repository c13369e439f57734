import { type LineSection, lineSections, saleUnitSchema } from '@lampwright/geometry/price';
import { Fragment } from 'react';
import { Link } from 'react-router-dom';
import { Empty } from '../../components/states';
import { Table } from '../../components/table';
import type { Materials } from './api';
import styles from './lines.module.css';
import { quantityText, sectionLabel } from './words';

interface MaterialsPartProps {
  readonly materials: Materials;
  readonly planHref: (recordIds: readonly string[]) => string;
}

const isSection = (text: string): text is LineSection => lineSections.some((section) => section === text);

/** What is needed to build the plan, without any money. */
export function MaterialsPart({ materials, planHref }: MaterialsPartProps) {
  if (materials.lines.length === 0)
    return <Empty title="Nothing to bring yet">Materials are counted from what is on the plan.</Empty>;
  const sections = [...new Set(materials.lines.map(({ section }) => section))];
  return (
    <Table label="Materials">
      <thead>
        <tr>
          <th scope="col">Item</th>
          <th scope="col" data-align="end">
            Quantity
          </th>
        </tr>
      </thead>
      <tbody className={styles.body}>
        {sections.map((section) => (
          <Fragment key={section}>
            <tr className={styles.section}>
              <th scope="rowgroup" colSpan={2}>
                {isSection(section) ? sectionLabel(section) : section}
              </th>
            </tr>
            {materials.lines
              .filter((line) => line.section === section)
              .map((line) => {
                const unit = saleUnitSchema.safeParse(line.unit);
                return (
                  <tr key={`${line.groupId} ${line.key}`} className={styles.line} data-origin="plan">
                    <td className={styles.what}>
                      <span className={styles.name}>{line.name}</span>
                      <span className={styles.source}>
                        {line.recordIds.length > 0 ? (
                          <Link to={planHref(line.recordIds)} title="Show on the plan">
                            {line.source}
                          </Link>
                        ) : (
                          line.source
                        )}
                      </span>
                    </td>
                    <td data-align="end" className={styles.figure}>
                      {unit.success
                        ? quantityText(line.quantity, unit.data, navigator.language)
                        : `${line.quantity} ${line.unit}`}
                    </td>
                  </tr>
                );
              })}
          </Fragment>
        ))}
      </tbody>
    </Table>
  );
}
