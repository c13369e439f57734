import { fromLuxUnit, inLuxUnit, type LuxUnit, luxUnitText, usualTargets } from '@lampwright/geometry/light';
import type { LightTarget } from '@lampwright/geometry/plan';
import { useEditor, useUnitSystem } from '../page/context';
import { CommitField, SelectField } from '../page/controls';
import styles from './inspector.module.css';

/** The bound that records are checked against. */
const MOST_LUX = 10_000;
const OWN = 'own';

interface LightTargetFieldsProps {
  readonly target: LightTarget | null;
  readonly mixed?: boolean;
  readonly commit: (target: LightTarget | null) => void;
}

/** What light is wanted there: one of the usual targets, with who says so, or figures of one's own. */
export function LightTargetFields({ target, mixed = false, commit }: LightTargetFieldsProps) {
  const editor = useEditor();
  const unit: LuxUnit = useUnitSystem() === 'imperial' ? 'foot-candle' : 'lux';
  const locked = !editor.canEdit;
  const usual = usualTargets.findIndex((u) => JSON.stringify(u.target) === JSON.stringify(target));
  const named = usualTargets[usual];
  const set = (fields: Partial<LightTarget>) => {
    if (target !== null) commit({ ...target, ...fields });
  };
  return (
    <fieldset className={styles.part}>
      <legend>Light wanted</legend>
      <SelectField
        label="Target"
        value={target === null ? '' : named === undefined ? OWN : `${usual}`}
        mixed={mixed}
        none="None"
        disabled={locked}
        options={[
          ...usualTargets.map((u, i) => ({ value: `${i}`, label: u.name })),
          { value: OWN, label: 'Own figures' },
        ]}
        onChange={(value) => {
          if (value === '') commit(null);
          else if (value !== OWN) commit(usualTargets[Number(value)]?.target ?? null);
          else commit(target ?? { leastLux: 1, meanLux: 2, uniformity: null });
        }}
      />
      {target !== null && !mixed && (
        <>
          <LuxField
            label="At least"
            lux={target.leastLux}
            unit={unit}
            disabled={locked}
            commit={(leastLux) => set({ leastLux })}
          />
          <LuxField
            label="Mean"
            lux={target.meanLux}
            unit={unit}
            disabled={locked}
            commit={(meanLux) => set({ meanLux })}
          />
          <CommitField
            label="Evenness"
            value={target.uniformity === null ? '' : `${target.uniformity}`}
            placeholder="none asked"
            inputMode="decimal"
            disabled={locked}
            hint="Darkest place divided by the mean, 0 to 1."
            commit={(text) => {
              if (text.trim() === '') {
                set({ uniformity: null });
                return null;
              }
              const uniformity = Number(text.trim().replace(',', '.'));
              if (!(uniformity >= 0 && uniformity <= 1)) return 'A share from 0 to 1.';
              set({ uniformity });
              return null;
            }}
          />
          {named !== undefined && <p className={styles.facts}>{named.source}. Guidance, not a rule.</p>}
        </>
      )}
    </fieldset>
  );
}

interface LuxFieldProps {
  readonly label: string;
  readonly lux: number | null;
  readonly unit: LuxUnit;
  readonly disabled: boolean;
  readonly commit: (lux: number | null) => void;
}

function LuxField({ label, lux, unit, disabled, commit }: LuxFieldProps) {
  return (
    <CommitField
      label={label}
      unit={luxUnitText(unit)}
      value={lux === null ? '' : `${Number(inLuxUnit(lux, unit).toPrecision(3))}`}
      placeholder="none asked"
      inputMode="decimal"
      disabled={disabled}
      commit={(text) => {
        if (text.trim() === '') {
          commit(null);
          return null;
        }
        const typed = fromLuxUnit(Number(text.trim().replace(',', '.')), unit);
        if (!(typed > 0 && typed <= MOST_LUX)) return 'More light than none, and less than by day.';
        commit(typed);
        return null;
      }}
    />
  );
}
