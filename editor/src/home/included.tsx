import { useState } from 'react';
import { type Choice, switched } from './choice';
import styles from './included.module.css';
import type { Group, ShareDocument } from './share';
import { lightsInWords, listOf, moneyOf, quantityOf } from './words';

interface Props {
  readonly document: ShareDocument;
  readonly choice: Choice;
  /** Null where the choice is no longer to be made. */
  readonly onChoose: ((choice: Choice) => void) | null;
}

interface Refused {
  readonly groupId: string;
  readonly reason: string;
  readonly instead: Choice | null;
}

/** The parts of the work, each with its price, and what can be switched. */
export function Included({ document, choice, onChoose }: Props) {
  const { price } = document;
  const [refused, setRefused] = useState<Refused | null>(null);

  const press = (groupId: string): void => {
    const outcome = switched(price, choice, groupId);
    if (outcome.kind === 'refused') {
      setRefused({ groupId, reason: outcome.reason, instead: outcome.instead });
      return;
    }
    setRefused(null);
    onChoose?.(outcome.choice);
  };

  return (
    <section aria-labelledby="included">
      <h2 id="included">What is included</h2>
      <ul className={styles.groups}>
        {price.groups.map((group) => {
          const { id } = group;
          return (
            <li key={id ?? 'base'} className={styles.group}>
              <GroupSwitch
                document={document}
                group={group}
                taken={id === null || choice.has(id)}
                onPress={id === null || !onChoose ? null : () => press(id)}
              />
              <div role="status" className={styles.live}>
                {refused !== null && refused.groupId === id && (
                  <div className={styles.refused}>
                    <p>{refused.reason}</p>
                    {refused.instead && (
                      <button
                        type="button"
                        className="button"
                        onClick={() => {
                          if (refused.instead) onChoose?.(refused.instead);
                          setRefused(null);
                        }}
                      >
                        Take {namesOf(document, refused.instead)} instead
                      </button>
                    )}
                  </div>
                )}
              </div>
              <MadeUpOf document={document} group={group} />
            </li>
          );
        })}
      </ul>
    </section>
  );
}

const namesOf = ({ price }: ShareDocument, choice: Choice): string =>
  choice.size === 0
    ? 'the base alone'
    : listOf(price.groups.flatMap(({ id, name }) => (id !== null && choice.has(id) ? [name] : [])));

function GroupSwitch({
  document,
  group,
  taken,
  onPress,
}: {
  readonly document: ShareDocument;
  readonly group: Group;
  readonly taken: boolean;
  readonly onPress: (() => void) | null;
}) {
  const money = moneyOf(document);
  const lights = document.lights.filter(({ groupId }) => groupId === group.id);
  const base = group.id === null;
  const about = [
    ...(base ? ['always part of the work'] : []),
    ...(group.fixtures > 0 ? [lightsInWords(group.fixtures, lights)] : []),
    ...(!base && !taken && onPress ? ['can be added'] : []),
    ...(!base && !taken && !onPress ? ['not chosen'] : []),
  ].join(', ');
  return (
    <label className={styles.switch} data-fixed={!onPress || undefined}>
      <input
        type="checkbox"
        className="check"
        checked={taken}
        disabled={!onPress}
        onChange={() => onPress?.()}
      />
      <span className={styles.name}>
        {group.name}
        <small>{about}</small>
        {group.description !== '' && <small>{group.description}</small>}
      </span>
      <span className={styles.price}>
        {taken ? '' : '+ '}
        {money(group.priceMinor)}
      </span>
    </label>
  );
}

function MadeUpOf({ document, group }: { readonly document: ShareDocument; readonly group: Group }) {
  const lines = document.price.lines.filter(({ groupId }) => groupId === group.id);
  const priced = lines.some(({ priceMinor }) => priceMinor !== null);
  const money = moneyOf(document);
  if (lines.length === 0) return null;
  return (
    <details className={styles.lines}>
      <summary>
        What makes up {money(group.priceMinor)}
        <span className="visually-hidden"> for {group.name}</span>
      </summary>
      <table>
        <thead>
          <tr>
            <th scope="col">Item</th>
            <th scope="col" className="figure">
              Quantity
            </th>
            {priced && (
              <th scope="col" className="figure">
                Price
              </th>
            )}
          </tr>
        </thead>
        <tbody>
          {lines.map((line) => (
            <tr key={line.key}>
              <td>{line.name}</td>
              <td className="figure">{quantityOf(line, document.locale)}</td>
              {priced && <td className="figure">{line.priceMinor === null ? '' : money(line.priceMinor)}</td>}
            </tr>
          ))}
        </tbody>
        {priced && (
          <tfoot>
            <tr>
              <th scope="row" colSpan={2}>
                {group.name}
              </th>
              <td className="figure">{money(group.priceMinor)}</td>
            </tr>
          </tfoot>
        )}
      </table>
    </details>
  );
}
