import type { Quote } from '@lampwright/geometry/price';
import { useState } from 'react';
import { Link } from 'react-router-dom';
import { Button, LinkButton } from '../../components/button';
import { ChevronDown } from '../../components/icons';
import { count } from '../../lib/format';
import { moneyOf } from '../../lib/money';
import type { Obstacle } from './api';
import styles from './sums.module.css';
import { dueLabel, percentText } from './words';

interface SumPanelProps {
  readonly quote: Quote;
  readonly seesCosts: boolean;
  readonly obstacles: readonly Obstacle[];
  /** Where an obstacle is mended. */
  readonly mendHref: (obstacle: Obstacle) => string;
  readonly proposalTo: string;
  /** They are being worked out anew. */
  readonly ahead: boolean;
  /** Edits that are not saved, and will not be by themselves just now, are not in the sums. */
  readonly behind: boolean;
  /** Why there can be no proposal now, obstacles apart. */
  readonly hold: string | null;
}

/** The sums of the price as it is offered; at the foot of a phone, a bar that opens. */
export function SumPanel(props: SumPanelProps) {
  const { quote, obstacles, ahead } = props;
  const [open, setOpen] = useState(false);
  const offered = quote.combinations[0];
  const total = moneyOf(quote)(offered?.totalMinor ?? 0);
  return (
    <aside className={styles.panel} data-open={open || undefined} aria-label="Sums">
      <button type="button" className={styles.bar} aria-expanded={open} onClick={() => setOpen(!open)}>
        <span className={styles.barTotal} data-ahead={ahead || undefined}>
          <span className="visually-hidden">Total </span>
          {total}
        </span>
        <span className={styles.barNote}>{standing(obstacles)}</span>
        <span className={styles.barArrow}>
          <ChevronDown />
        </span>
      </button>
      <div className={styles.content}>
        {/* biome-ignore lint/a11y/noNoninteractiveTabindex: it scrolls, and has nothing to focus in it. */}
        <section className={styles.scroll} tabIndex={0} aria-label="What makes up the price">
          <Sums {...props} />
          <Margin {...props} />
        </section>
        {props.behind && <p className={styles.behind}>Without your changes that are not saved.</p>}
        <Way {...props} />
      </div>
    </aside>
  );
}

const standing = (obstacles: readonly Obstacle[]): string =>
  obstacles.length === 0 ? 'Ready for a proposal' : `${count(obstacles.length, 'thing')} before a proposal`;

function Sums({ quote, ahead }: SumPanelProps) {
  const money = moneyOf(quote);
  const offered = quote.combinations[0];
  if (!offered) return null;
  const taken = quote.groups.filter(({ id }) => id === null || offered.groups.includes(id));
  const added = quote.groups.filter(({ id }) => id !== null && !offered.groups.includes(id));
  return (
    <div className={styles.block} data-ahead={ahead || undefined}>
      <h2 className={styles.title}>As offered</h2>
      <dl className={styles.sums}>
        {taken.length > 1 &&
          taken.map(({ id, name, priceMinor }) => (
            <Row key={id ?? 'base'} term={name} sum={money(priceMinor)} />
          ))}
        <Row term="Subtotal" sum={money(offered.subtotalMinor)} strong={taken.length > 1} />
        {offered.discountMinor > 0 && (
          <Row term={quote.discountName || 'Discount'} sum={money(-offered.discountMinor)} />
        )}
        {quote.tax ? (
          <Row
            term={`${quote.tax.name} ${percentText(quote.tax.percent, quote.locale)}`}
            note={`on ${money(offered.taxableMinor)}`}
            sum={money(offered.taxMinor)}
          />
        ) : (
          <Row term="Tax" sum="none" />
        )}
        <div className={styles.total}>
          <dt>Total</dt>
          <dd>{money(offered.totalMinor)}</dd>
        </div>
      </dl>
      {added.length > 0 && (
        <>
          <h3 className={styles.small}>Offered on top, before tax</h3>
          <dl className={styles.sums}>
            {added.map(({ id, name, priceMinor }) => (
              <Row key={id} term={name} sum={`+${money(priceMinor)}`} />
            ))}
          </dl>
        </>
      )}
      <h3 className={styles.small}>Payment</h3>
      <dl className={styles.sums}>
        {offered.stages.map(({ id, name, due, amountMinor, capped }) => (
          <Row
            key={id}
            term={name}
            note={capped ? `${dueLabel(due)}, held to the cap` : dueLabel(due)}
            sum={money(amountMinor)}
          />
        ))}
      </dl>
    </div>
  );
}

interface RowProps {
  readonly term: string;
  readonly note?: string;
  readonly sum: string;
  readonly strong?: boolean;
}

const Row = ({ term, note, sum, strong = false }: RowProps) => (
  <div data-strong={strong || undefined}>
    <dt>
      {term}
      {note && <span className={styles.note}>{note}</span>}
    </dt>
    <dd>{sum}</dd>
  </div>
);

function Margin({ quote, seesCosts, ahead }: SumPanelProps) {
  if (!seesCosts) return null;
  const money = moneyOf(quote);
  const { margin } = quote;
  return (
    <div className={styles.block} data-ahead={ahead || undefined}>
      <h2 className={styles.title}>What is left</h2>
      {margin === null ? (
        <p className={styles.note}>Not known while a line has no cost.</p>
      ) : (
        <dl className={styles.sums}>
          <Row term="Cost" sum={money(margin.costMinor)} />
          <Row term="Overhead" sum={money(margin.overheadMinor)} />
          <Row
            term="Profit"
            note={
              margin.profitPercent === null
                ? undefined
                : `${percentText(margin.profitPercent, quote.locale)} of the price before tax`
            }
            sum={money(margin.profitMinor)}
            strong
          />
        </dl>
      )}
    </div>
  );
}

function Way({ obstacles, mendHref, proposalTo, hold }: SumPanelProps) {
  const reason = hold ?? (obstacles.length > 0 ? standing(obstacles) : null);
  return (
    <div className={styles.way}>
      {obstacles.length > 0 && (
        <>
          <h2 className={styles.title}>{standing(obstacles)}</h2>
          <ul className={styles.obstacles}>
            {obstacles.map((obstacle) => (
              <li key={`${obstacle.mend} ${obstacle.message}`}>
                <Link to={mendHref(obstacle)}>{obstacle.message}</Link>
              </li>
            ))}
          </ul>
        </>
      )}
      {reason === null ? (
        <LinkButton to={proposalTo} kind="lamp" size="large" wide>
          Make the proposal
        </LinkButton>
      ) : (
        <>
          <Button kind="lamp" size="large" wide disabled aria-describedby="no-proposal">
            Make the proposal
          </Button>
          <p id="no-proposal" className={styles.note}>
            {hold ?? 'Once what stands above is mended.'}
          </p>
        </>
      )}
    </div>
  );
}
