import { useEffect, useRef } from 'react';
import type { Group, Light } from '../share';
import { capital, count, kindInWords, sentence } from '../words';
import styles from './light-card.module.css';
import type { ShownMark } from './mark';

interface Props {
  readonly mark: ShownMark;
  readonly group: Group | undefined;
  readonly locale: string;
  /** How a light differs from the approved version, in a sentence. */
  readonly changed: string | null;
  readonly questions: number;
  readonly onAsk: (() => void) | null;
  readonly onQuestions: () => void;
  readonly onClose: () => void;
}

/** What one light is, what it lights and what it belongs to. */
export function LightCard({ mark, group, locale, changed, questions, onAsk, onQuestions, onClose }: Props) {
  const { light } = mark;
  const heading = useRef<HTMLHeadingElement>(null);
  const { recordId } = light;

  // biome-ignore lint/correctness/useExhaustiveDependencies: another light is another card
  useEffect(() => {
    heading.current?.focus({ preventScroll: true });
    heading.current?.scrollIntoView?.({ block: 'nearest', behavior: 'smooth' });
  }, [recordId]);

  return (
    <section className={styles.card} aria-labelledby="light-card">
      <div className={styles.head}>
        <h2 id="light-card" ref={heading} tabIndex={-1}>
          {capital(kindInWords(light))} {light.tag}
          <small>
            {light.name}
            {light.quantity > 1 && ` × ${light.quantity}`}
          </small>
        </h2>
        <button type="button" className="icon-button" aria-label="Close" onClick={onClose}>
          <svg viewBox="0 0 20 20" aria-hidden="true" focusable="false">
            <path d="m5 5 10 10M15 5 5 15" />
          </svg>
        </button>
      </div>
      {light.lights !== '' && <p>{sentence(light.lights)}</p>}
      {group && <p className="quiet">{belonging(group, mark.taken)}</p>}
      {changed !== null && <p className={styles.changed}>{changed}</p>}
      <Technical light={light} locale={locale} />
      {(onAsk || questions > 0) && (
        <div className={styles.actions}>
          {onAsk && (
            <button type="button" className="button" onClick={onAsk}>
              Ask about this light
            </button>
          )}
          {questions > 0 && (
            <button type="button" className="quiet-button" onClick={onQuestions}>
              See {count(questions, 'question')}
            </button>
          )}
        </div>
      )}
    </section>
  );
}

const belonging = (group: Group, taken: boolean): string => {
  if (group.id === null) return `Part of “${group.name}”, which is always in.`;
  return taken ? `Part of “${group.name}”.` : `Part of “${group.name}”, which is not chosen.`;
};

function Technical({ light: { technical }, locale }: { readonly light: Light; readonly locale: string }) {
  const n = new Intl.NumberFormat(locale, { maximumFractionDigits: 1 });
  const figures: (readonly [string, number | null, string])[] = [
    ['Volts at the light', technical.volts, 'V'],
    ['Power', technical.watts, 'W'],
    ['Light output', technical.lumens, 'lm'],
    ['Beam', technical.beamDegrees, '°'],
    ['Colour temperature', technical.cctKelvin, 'K'],
  ];
  const known = figures.filter(([, value]) => value !== null);
  if (known.length === 0) return null;
  return (
    <details>
      <summary>Technical details</summary>
      <dl className={styles.figures}>
        {known.map(([name, value, unit]) => (
          <div key={name}>
            <dt>{name}</dt>
            <dd>
              {n.format(value ?? 0)}
              {unit === '°' ? '' : ' '}
              {unit}
            </dd>
          </div>
        ))}
      </dl>
    </details>
  );
}
