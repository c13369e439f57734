import type { CatalogueCategory } from '@lampwright/geometry/catalogue';
import { useQuery } from '@tanstack/react-query';
import { Section } from '../../components/page';
import { Problem, SkeletonRows } from '../../components/states';
import { Table } from '../../components/table';
import { showToast } from '../../components/toast';
import { formatMoment } from '../../lib/format';
import { type MoneyManner, moneyOf } from '../../lib/money';
import { useUnits } from '../../lib/units';
import { cataloguePricesQuery, type PriceHistory, priceHistoryQuery } from './api';
import styles from './item-price.module.css';
import { emptyPrice, ItemPriceForm } from './item-price-form';
import { unitLabel } from './words';

interface ItemPriceSectionProps {
  readonly itemId: string;
  readonly category: CatalogueCategory;
  readonly editable: boolean;
}

/** Price and price history of a catalogue item, on its own screen. */
export function ItemPriceSection({ itemId, category, editable }: ItemPriceSectionProps) {
  const prices = useQuery(cataloguePricesQuery);
  const history = useQuery(priceHistoryQuery(itemId));
  const imperial = useUnits() === 'imperial';
  return (
    <Section title="Price" lede="For every job that has no proposal yet. What was offered stays as it was.">
      <div className={styles.body}>
        {prices.isPending && <SkeletonRows rows={4} label="Loading the price" />}
        {prices.isError && <Problem error={prices.error} onRetry={() => void prices.refetch()} />}
        {prices.data && editable && !prices.data.seesCosts && (
          <p className="quiet">
            Prices are changed by those who see costs: an owner can let you under Price book.
          </p>
        )}
        {prices.data && editable && prices.data.seesCosts && (
          <ItemPriceForm
            key={prices.data.items.find((entry) => entry.itemId === itemId)?.since ?? 'none'}
            itemId={itemId}
            start={
              prices.data.items.find((entry) => entry.itemId === itemId)?.price ??
              emptyPrice(category !== 'cable' ? 'each' : imperial ? 'foot' : 'meter')
            }
            manner={prices.data}
            seesCosts={prices.data.seesCosts}
            onSaved={() => void showToast({ message: 'The price is saved.' })}
          />
        )}
        {history.isError && <Problem error={history.error} onRetry={() => void history.refetch()} />}
        {prices.data && history.data && history.data.length > 0 && (
          <History items={history.data} manner={prices.data} seesCosts={prices.data.seesCosts} />
        )}
      </div>
    </Section>
  );
}

interface HistoryProps {
  readonly items: PriceHistory['items'];
  readonly manner: MoneyManner;
  readonly seesCosts: boolean;
}

function History({ items, manner, seesCosts }: HistoryProps) {
  const money = moneyOf(manner);
  const sum = (amount: number | null) => (amount === null ? <span className="quiet">–</span> : money(amount));
  return (
    <div>
      <h3 className={styles.title}>Prices so far</h3>
      <Table label="Prices so far">
        <thead>
          <tr>
            <th scope="col">Since</th>
            {seesCosts && (
              <th scope="col" data-align="end">
                Cost
              </th>
            )}
            <th scope="col" data-align="end">
              Price
            </th>
            <th scope="col">For</th>
            <th scope="col">Set by</th>
          </tr>
        </thead>
        <tbody>
          {items.map(({ price, since, by, importedFrom }) => (
            <tr key={since}>
              <td>{formatMoment(since)}</td>
              {seesCosts && <td data-align="end">{sum(price.costMinor)}</td>}
              <td data-align="end">
                {price.priceMinor === null && price.costMinor !== null ? (
                  <span className="quiet">from the cost</span>
                ) : (
                  sum(price.priceMinor)
                )}
              </td>
              <td>{price.per === 1 ? unitLabel(price.unit) : `${price.per} ${unitLabel(price.unit)}`}</td>
              <td>
                {by}
                {importedFrom !== null && <span className={styles.from}>from {importedFrom}</span>}
              </td>
            </tr>
          ))}
        </tbody>
      </Table>
    </div>
  );
}
