import { useEffect, useRef, useState } from 'react';
import type { Combination, ShareDocument } from './share';
import styles from './totals.module.css';
import { moneyOf, percentOf, stageInWords } from './words';

interface Props {
  readonly document: ShareDocument;
  readonly sums: Combination;
}

/** From the subtotal to what is paid when, with what makes up each sum. */
export function Totals({ document, sums }: Props) {
  const money = moneyOf(document);
  const { price, locale } = document;
  const { tax } = price;
  return (
    <dl className={styles.sums}>
      <Sum name="Subtotal" amount={money(sums.subtotalMinor)} />
      {sums.discountMinor > 0 && (
        <Sum name={price.discountName || 'Discount'} amount={`−${money(sums.discountMinor)}`} />
      )}
      {tax && (
        <Sum
          name={[
            `${tax.name} ${percentOf(tax.percent, locale)}`,
            ...(tax.jurisdiction === '' ? [] : [`(${tax.jurisdiction})`]),
            `on ${money(sums.taxableMinor)}`,
          ].join(' ')}
          amount={money(sums.taxMinor)}
        />
      )}
      <Sum name="Total" amount={money(sums.totalMinor)} strong />
      {sums.stages.map((stage) => (
        <Sum
          key={stage.id}
          name={stageInWords(stage, locale)}
          note={stage.capped ? 'limited by law' : ''}
          amount={money(stage.amountMinor)}
        />
      ))}
    </dl>
  );
}

interface SumProps {
  readonly name: string;
  readonly note?: string;
  readonly amount: string;
  readonly strong?: boolean;
}

export function Sum({ name, note = '', amount, strong = false }: SumProps) {
  return (
    <div className={styles.sum} data-strong={strong || undefined}>
      <dt>
        {name}
        {note !== '' && <small> ({note})</small>}
      </dt>
      <dd>{amount}</dd>
    </div>
  );
}

/** Says a new total aloud; the one that the page begins with is read with the page. */
export function TotalAloud({ document, sums }: Props) {
  const money = moneyOf(document);
  const first = useRef(sums.totalMinor);
  const [said, setSaid] = useState('');
  const [stage] = sums.stages;
  const words = `Total ${money(sums.totalMinor)}.${stage ? ` ${stage.name} ${money(stage.amountMinor)}.` : ''}`;
  useEffect(() => {
    if (sums.totalMinor === first.current) return;
    first.current = Number.NaN;
    setSaid(words);
  }, [sums.totalMinor, words]);
  return (
    <p className="visually-hidden" role="status">
      {said}
    </p>
  );
}
