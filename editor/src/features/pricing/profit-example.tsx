import { type PriceBook, priceFor } from '@lampwright/geometry/price';
import { type MoneyManner, moneyOf } from '../../lib/money';
import styles from './book.module.css';

const EXAMPLE_MINOR = 10_000;

/** What becomes of a round cost, while one types; null while the numbers can't be reckoned with. */
export function exampleOf(
  { overheadPercent, materials, labour }: Pick<PriceBook, 'overheadPercent' | 'materials' | 'labour'>,
  of: 'materials' | 'labour',
): number | null {
  const profit = of === 'materials' ? materials : labour;
  const known = [overheadPercent, profit.percent].every((n) => Number.isFinite(n) && n >= 0);
  if (!known || (profit.by === 'margin' && profit.percent > 95)) return null;
  return priceFor(1, EXAMPLE_MINOR, 1, { overheadPercent, profit });
}

export function ProfitExample({ book, manner }: { readonly book: PriceBook; readonly manner: MoneyManner }) {
  const money = moneyOf(manner);
  const text = (of: 'materials' | 'labour') => {
    const price = exampleOf(book, of);
    return price === null ? '–' : money(price);
  };
  return (
    <p className={styles.example} aria-live="polite">
      <span>
        A part that costs {money(EXAMPLE_MINOR)} sells for <strong>{text('materials')}</strong>.
      </span>
      <span>
        Work that costs {money(EXAMPLE_MINOR)} sells for <strong>{text('labour')}</strong>.
      </span>
    </p>
  );
}
