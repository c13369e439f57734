import { type LineSection, lineSections, saleUnitSchema } from '@lampwright/geometry/price';
import { Fragment } from 'react';
import { Link } from 'react-router-dom';
import { Empty } from '../../components/states';
import { Table } from '../../components/table';
import type { Materials } from './api';
import { gather } from './gather';
import styles from './lines.module.css';
import { quantityText, sectionLabel } from './words';

interface MaterialsPartProps {
  readonly materials: Materials;
  readonly planHref: (recordIds: readonly string[]) => string;
}

const isSection = (text: string): text is LineSection => lineSections.some((section) => section === text);

function amount(quantity: number, text: string): string {
  const unit = saleUnitSchema.safeParse(text);
  return unit.success ? quantityText(quantity, unit.data, navigator.language) : `${quantity} ${text}`;
}

/** What is needed to build the plan, without any money. */
export function MaterialsPart({ materials, planHref }: MaterialsPartProps) {
  if (materials.lines.length === 0)
    return <Empty title="Nothing to bring yet">Materials are counted from what is on the plan.</Empty>;
  const things = gather(materials.lines);
  const sections = [...new Set(things.map(({ section }) => section))];
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
            {things
              .filter((thing) => thing.section === section)
              .map(({ name, unit, quantity, uses }) => (
                <tr key={`${name} ${unit}`} className={styles.line} data-origin="plan">
                  <td className={styles.what}>
                    <span className={styles.name}>{name}</span>
                    {uses.map(({ key, groupId, source, recordIds }) => (
                      <span key={`${groupId} ${key}`} className={styles.source}>
                        {recordIds.length > 0 ? (
                          <Link to={planHref(recordIds)} title="Show on the plan">
                            {source}
                          </Link>
                        ) : (
                          source
                        )}
                      </span>
                    ))}
                  </td>
                  <td data-align="end" className={styles.figure}>
                    {amount(quantity, unit)}
                  </td>
                </tr>
              ))}
          </Fragment>
        ))}
      </tbody>
    </Table>
  );
}
