import type { PaymentStage } from '@lampwright/geometry/price';
import { Button } from '../../components/button';
import { PlusIcon } from '../../components/icons';
import { Select } from '../../components/select';
import { CommitField } from './commit-field';
import { readPercent } from './read-number';
import styles from './stages.module.css';
import { dues, numberText } from './words';

const MOST_STAGES = 6;

interface StagesEditorProps {
  readonly stages: readonly PaymentStage[];
  readonly locale: string;
  readonly disabled?: boolean;
  readonly onChange: (stages: PaymentStage[]) => void;
}

/** What falls due when. The last stage takes what the others leave, so that its share is not typed. */
export function StagesEditor({ stages, locale, disabled = false, onChange }: StagesEditorProps) {
  const early = stages.slice(0, -1).reduce((sum, { percent }) => sum + percent, 0);
  const change = (i: number, part: Partial<PaymentStage>) =>
    onChange(withRest(stages.map((stage, at) => (at === i ? { ...stage, ...part } : stage))));
  return (
    <div className={styles.stages}>
      <ol className={styles.list}>
        {stages.map((stage, i) => {
          const last = i === stages.length - 1;
          const left = 100 - (early - stage.percent);
          return (
            <li key={stage.id} className={styles.stage}>
              <CommitField
                label={`Name of stage ${i + 1}`}
                hideLabel
                value={stage.name}
                maxLength={60}
                disabled={disabled}
                onCommit={(text) => {
                  if (text.trim() === '') return 'Please give it a name.';
                  change(i, { name: text.trim() });
                  return null;
                }}
              />
              {last ? (
                <span className={styles.rest}>
                  {numberText(Math.max(0, 100 - early), locale, 4)} %, the rest
                </span>
              ) : (
                <CommitField
                  label={`Share of ${stage.name}`}
                  hideLabel
                  numeric
                  unit="%"
                  value={numberText(stage.percent, locale, 4)}
                  disabled={disabled}
                  onCommit={(text) => {
                    const percent = readPercent(text, left);
                    if (percent === null)
                      return `Please write a share of at most ${numberText(left, locale, 4)} %.`;
                    change(i, { percent });
                    return null;
                  }}
                />
              )}
              <Select
                aria-label={`When ${stage.name} is due`}
                value={stage.due}
                disabled={disabled}
                onChange={(event) => change(i, { due: event.target.value as PaymentStage['due'] })}
              >
                {dues.map(({ value, label }) => (
                  <option key={value} value={value}>
                    {label}
                  </option>
                ))}
              </Select>
              {!disabled && stages.length > 1 && (
                <Button
                  kind="bare"
                  aria-label={`Remove ${stage.name}`}
                  onClick={() => onChange(withRest(stages.filter(({ id }) => id !== stage.id)))}
                >
                  Remove
                </Button>
              )}
            </li>
          );
        })}
      </ol>
      {!disabled && stages.length < MOST_STAGES && (
        <div>
          <Button onClick={() => onChange(withNewStage(stages))}>
            <PlusIcon />
            Add a stage
          </Button>
        </div>
      )}
    </div>
  );
}

/** The last stage's own share is what is left, so that it reads right wherever it is read. */
export function withRest(stages: readonly PaymentStage[]): PaymentStage[] {
  const early = stages.slice(0, -1).reduce((sum, { percent }) => sum + percent, 0);
  // Percents have four decimals; sums of them in floating point have more.
  const rest = Math.max(0, Math.round((100 - early) * 10_000) / 10_000);
  return stages.map((stage, i) => (i === stages.length - 1 ? { ...stage, percent: rest } : stage));
}

/** A new stage comes before the last, which goes on taking the rest. */
function withNewStage(stages: readonly PaymentStage[]): PaymentStage[] {
  const added: PaymentStage = { id: crypto.randomUUID(), name: 'Progress', due: 'start', percent: 0 };
  return withRest([...stages.slice(0, -1), added, ...stages.slice(-1)]);
}
