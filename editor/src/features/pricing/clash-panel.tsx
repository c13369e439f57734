import { useEffect, useRef, useState } from 'react';
import { Button } from '../../components/button';
import type { MoneyManner } from '../../lib/money';
import { type ClashNames, clashTitle, clashValue } from './clash-words';
import styles from './screen.module.css';
import type { PricingState, PricingStore } from './store/pricing-store';
import { clashKey, type Side } from './store/rebase';

interface ClashPanelProps {
  readonly store: PricingStore;
  readonly state: PricingState;
  readonly names: ClashNames;
  readonly manner: MoneyManner;
}

/** Two people changed the same: both are shown, and one chooses. Until then nothing more is saved. */
export function ClashPanel({ store, state: { clash, pricing }, names, manner }: ClashPanelProps) {
  const [sides, setSides] = useState<ReadonlyMap<string, Side>>(new Map());
  const heading = useRef<HTMLHeadingElement>(null);
  const asked = clash !== null;
  useEffect(() => {
    // It stands at the head of the page: whoever is at work further down has to see it.
    if (asked) heading.current?.focus();
  }, [asked]);
  if (clash === null) return null;
  const sideOf = (key: string): Side => sides.get(key) ?? 'mine';
  return (
    <section className={styles.clash} aria-label="Changed by two people">
      <h2 ref={heading} tabIndex={-1}>
        Somebody else changed the same
      </h2>
      <p className="quiet">Choose what counts. Your other changes wait here until then.</p>
      {clash.parts.map((part) => {
        const key = clashKey(part);
        const options = [
          { side: 'mine', label: 'Yours', of: pricing },
          { side: 'theirs', label: 'Theirs', of: clash.theirs.pricing },
        ] as const;
        return (
          <fieldset key={key} className={styles.clashPart}>
            <legend>{clashTitle(part, pricing, clash.theirs.pricing, names)}</legend>
            {options.map(({ side, label, of }) => (
              <label key={side}>
                <input
                  type="radio"
                  name={key}
                  checked={sideOf(key) === side}
                  onChange={() => setSides(new Map(sides).set(key, side))}
                />
                <span>
                  <strong>{label}:</strong> {clashValue(part, of, names, manner)}
                </span>
              </label>
            ))}
          </fieldset>
        );
      })}
      <div>
        <Button kind="strong" onClick={() => store.settle((part) => sideOf(clashKey(part)))}>
          Go on with these
        </Button>
      </div>
    </section>
  );
}
