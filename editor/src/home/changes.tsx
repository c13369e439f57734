import { lengthText } from '@lampwright/geometry/price';
import styles from './changes.module.css';
import type { Differences, SharedPage } from './share';
import { moneyOf } from './words';

/** What is other than in the version that was approved before. */
export function Changes({ page }: { readonly page: SharedPage }) {
  const { differences, document } = page;
  if (!differences) return null;
  const money = moneyOf(document);
  const lists = [
    { title: 'New', items: differences.added.map(({ tag, name }) => `${tag}, ${name}`) },
    { title: 'No longer planned', items: differences.removed.map(({ tag, name }) => `${tag}, ${name}`) },
    {
      title: 'Moved',
      items: differences.moved.map(
        (moved) => `${moved.tag}, ${moved.name}${byHowFar(moved.meters, document)}`,
      ),
    },
    { title: 'Changed', items: differences.replaced.map(({ tag, was, now }) => `${tag}: ${was} → ${now}`) },
    { title: 'In the sums', items: differences.lines.map((line) => lineChange(line, money)) },
  ].filter(({ items }) => items.length > 0);
  const by = differences.nowTotalMinor - differences.wasTotalMinor;
  return (
    <section className={styles.changes} aria-labelledby="changes">
      <h2 id="changes">What changed since you approved</h2>
      {lists.map(({ title, items }) => (
        <div key={title} className={styles.group}>
          <h3>{title}</h3>
          <ul>
            {items.map((item) => (
              <li key={item}>{item}</li>
            ))}
          </ul>
        </div>
      ))}
      <p className={styles.total}>
        {by === 0
          ? `The total stays ${money(differences.nowTotalMinor)}.`
          : `The total goes from ${money(differences.wasTotalMinor)} to ${money(differences.nowTotalMinor)}: ${money(Math.abs(by))} ${by > 0 ? 'more' : 'less'}.`}
      </p>
    </section>
  );
}

type Moved = Differences['moved'][number];

const byHowFar = (meters: Moved['meters'], { units }: SharedPage['document']): string =>
  meters === null ? '' : `, by ${lengthText(meters, units === 'imperial' ? 'foot' : 'meter')}`;

function lineChange(
  { name, wasQuantity, nowQuantity, unit, byMinor }: Differences['lines'][number],
  money: (minor: number) => string,
): string {
  const quantity = wasQuantity === nowQuantity ? '' : `, ${wasQuantity} → ${nowQuantity}${unitAfter(unit)}`;
  const price =
    byMinor === null || byMinor === 0 ? '' : `, ${byMinor > 0 ? '+' : '−'}${money(Math.abs(byMinor))}`;
  return `${name}${quantity}${price}`;
}

const unitAfter = (unit: string): string => {
  switch (unit) {
    case 'foot':
      return ' ft';
    case 'meter':
      return ' m';
    default:
      return '';
  }
};

/** How each changed light differs, by record. */
export function changeSentences({ differences, document }: SharedPage): ReadonlyMap<string, string> {
  const sentences = new Map<string, string>();
  if (!differences) return sentences;
  for (const { recordId, meters } of differences.moved)
    sentences.set(recordId, `Moved${byHowFar(meters, document)} since you approved.`);
  for (const { recordId, was } of differences.replaced)
    sentences.set(recordId, `Changed since you approved. It was: ${was}.`);
  for (const { recordId } of differences.added) sentences.set(recordId, 'New since you approved.');
  return sentences;
}
