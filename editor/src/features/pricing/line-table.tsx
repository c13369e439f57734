import type { LineOverride, ManualLine, QuoteWarning } from '@lampwright/geometry/price';
import { Fragment, useState } from 'react';
import { Link } from 'react-router-dom';
import { Button } from '../../components/button';
import { CheckIcon } from '../../components/icons';
import { Table } from '../../components/table';
import { count } from '../../lib/format';
import type { MoneyManner } from '../../lib/money';
import { moneyOf } from '../../lib/money';
import type { GroupOfLines, ShownLine } from './arrange';
import { manualIdOf } from './arrange';
import { LineForm } from './line-form';
import styles from './lines.module.css';
import { quantityText, sectionLabel } from './words';

export interface LineTableProps {
  readonly groups: readonly GroupOfLines[];
  readonly manner: MoneyManner;
  readonly seesCosts: boolean;
  readonly editable: boolean;
  readonly warnings: readonly QuoteWarning[];
  readonly manualLines: readonly ManualLine[];
  readonly overrides: Readonly<Record<string, LineOverride>>;
  readonly planHref: (recordIds: readonly string[]) => string;
  readonly onOverride: (line: ShownLine, value: LineOverride | null) => void;
  readonly onEditManual: (line: ManualLine) => void;
  readonly onRemoveManual: (line: ManualLine) => void;
  readonly onPriceItem: (itemId: string, name: string) => void;
}

/** The lines of a price by group and section. Those that the plan alone says are calm; what a hand wrote stands out. */
export function LineTable(props: LineTableProps) {
  const { groups, manner, seesCosts } = props;
  const [editing, setEditing] = useState<string | null>(null);
  const money = moneyOf(manner);
  const columns = seesCosts ? 6 : 5;
  const grouped = groups.length > 1;
  return (
    <Table label="Lines of the price">
      <thead>
        <tr>
          <th scope="col">Item</th>
          <th scope="col" data-align="end" className={styles.wide}>
            Quantity
          </th>
          {seesCosts && (
            <th scope="col" data-align="end" className={styles.wide}>
              Cost
            </th>
          )}
          <th scope="col" data-align="end">
            Price
          </th>
          <th scope="col" className={styles.wide}>
            Taxed
          </th>
          <th scope="col">
            <span className="visually-hidden">Change</span>
          </th>
        </tr>
      </thead>
      {groups.map(({ group, sections }) => (
        <tbody key={group.id ?? 'base'} className={styles.body}>
          {grouped && (
            <tr className={styles.group}>
              <th scope="rowgroup" colSpan={columns}>
                <span className={styles.groupHead}>
                  <span className={styles.groupName}>{group.name}</span>
                  <span className={styles.groupNote}>
                    {group.id === null ? 'always in' : group.on ? 'in the price' : 'offered as an addition'}
                    {' · '}
                    {count(group.fixtures, 'light')}
                  </span>
                  <span className={styles.groupPrice}>{money(group.priceMinor)}</span>
                </span>
              </th>
            </tr>
          )}
          {sections.length === 0 && (
            <tr className={styles.still}>
              <td colSpan={columns} className={styles.nothing}>
                Nothing is in this group yet.
              </td>
            </tr>
          )}
          {sections.map(({ section, lines }) => (
            <Fragment key={section}>
              <tr className={styles.section}>
                <th scope="rowgroup" colSpan={columns}>
                  {sectionLabel(section)}
                </th>
              </tr>
              {lines.map((line) =>
                editing === line.key ? (
                  <tr key={line.key} className={styles.still}>
                    <td colSpan={columns}>
                      <LineForm
                        line={line}
                        own={props.overrides[line.key] ?? null}
                        manner={manner}
                        onClose={() => setEditing(null)}
                        onSave={(value) => {
                          props.onOverride(line, value);
                          setEditing(null);
                        }}
                      />
                    </td>
                  </tr>
                ) : (
                  <LineRow key={line.key} line={line} {...props} onEdit={() => setEditing(line.key)} />
                ),
              )}
            </Fragment>
          ))}
        </tbody>
      ))}
    </Table>
  );
}

interface LineRowProps extends LineTableProps {
  readonly line: ShownLine;
  readonly onEdit: () => void;
}

function LineRow({
  line,
  manner,
  seesCosts,
  editable,
  warnings,
  manualLines,
  planHref,
  onEdit,
  onOverride,
  onEditManual,
  onRemoveManual,
  onPriceItem,
}: LineRowProps) {
  const money = moneyOf(manner);
  const quantity = quantityText(line.quantity, line.unit, manner.locale);
  const manualId = manualIdOf(line.key);
  const manual = manualLines.find(({ id }) => id === manualId);
  const own = warnings.filter(({ lineKey }) => lineKey === line.key);
  const { itemId } = line;
  return (
    <tr className={styles.line} data-origin={line.origin} data-ahead={line.ahead || undefined}>
      <td className={styles.what}>
        <span className={styles.name}>{line.name}</span>
        {line.origin === 'manual' && <span className={styles.chip}>written by hand</span>}
        {line.origin === 'overridden' && <span className={styles.chip}>changed by hand</span>}
        <span className={styles.narrow}>{quantity}</span>
        {line.origin !== 'manual' && line.source !== '' && (
          <span className={styles.source}>
            {line.recordIds.length > 0 ? (
              <Link to={planHref(line.recordIds)} title="Show on the plan">
                {line.source}
              </Link>
            ) : (
              line.source
            )}
          </span>
        )}
        {line.origin === 'overridden' && line.planned && (
          <span className={styles.said}>
            The plan says {quantityText(line.planned.quantity, line.unit, manner.locale)}
            {line.planned.priceMinor !== null && ` for ${money(line.planned.priceMinor)}`}.
            {line.note !== '' && ` “${line.note}”`}{' '}
            {editable && (
              <button type="button" className={styles.inText} onClick={() => onOverride(line, null)}>
                Back to the plan’s
              </button>
            )}
          </span>
        )}
        {own.map(({ code, message }) => (
          <span key={code} className={styles.warning}>
            {message}{' '}
            {editable && seesCosts && code === 'no-price' && itemId !== null && (
              <button type="button" className={styles.inText} onClick={() => onPriceItem(itemId, line.name)}>
                Price it
              </button>
            )}
          </span>
        ))}
      </td>
      <td data-align="end" className={`${styles.wide} ${styles.figure}`}>
        {quantity}
      </td>
      {seesCosts && (
        <td data-align="end" className={`${styles.wide} ${styles.figure} ${styles.cost}`}>
          {line.costMinor === null ? <None>no cost</None> : money(line.costMinor)}
        </td>
      )}
      <td data-align="end" className={styles.figure}>
        {line.priceMinor === null ? <None>no price</None> : money(line.priceMinor)}
      </td>
      <td className={`${styles.wide} ${styles.taxed}`}>
        {line.taxable && (
          <>
            <CheckIcon />
            <span className="visually-hidden">taxed</span>
          </>
        )}
      </td>
      <td className={styles.act}>
        {editable && (
          <Button
            kind="bare"
            aria-label={`Change ${line.name}`}
            onClick={manual ? () => onEditManual(manual) : onEdit}
          >
            Change
          </Button>
        )}
        {editable && manual && (
          <Button kind="bare" aria-label={`Remove ${line.name}`} onClick={() => onRemoveManual(manual)}>
            Remove
          </Button>
        )}
      </td>
    </tr>
  );
}

const None = ({ children }: { children: string }) => (
  <>
    <span aria-hidden="true">–</span>
    <span className="visually-hidden">{children}</span>
  </>
);
