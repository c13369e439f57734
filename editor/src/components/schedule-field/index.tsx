import { scheduleInWords } from '@lampwright/geometry/night';
import type { Schedule } from '@lampwright/geometry/plan';
import { useState } from 'react';
import { type Control, type FieldPath, type FieldValues, useController } from 'react-hook-form';
import { Choice } from '../form';
import form from '../form/form.module.css';
import styles from './schedule-field.module.css';
import { isSchedule, ScheduleInputs } from './schedule-inputs';

interface Labelled {
  readonly label: string;
  readonly hint?: string;
  readonly disabled?: boolean;
}

type FieldProps<In extends FieldValues, Out> = Labelled & {
  readonly control: Control<In, unknown, Out>;
  readonly name: FieldPath<In>;
};

/** When lights are on, as a field of a form. */
export function ScheduleField<In extends FieldValues, Out>(props: FieldProps<In, Out>) {
  const { control, name, label, hint, disabled = false } = props;
  const { field } = useController({ control, name });
  return (
    <fieldset className={styles.schedule}>
      <legend className={form.choiceLegend}>{label}</legend>
      {hint && <span className={form.hint}>{hint}</span>}
      <ScheduleInputs
        value={field.value as Schedule}
        onChange={field.onChange}
        onSettle={field.onBlur}
        disabled={disabled}
      />
    </fieldset>
  );
}

interface ControlProps<S extends Schedule | null> extends Labelled {
  readonly value: S;
  /** Called with a whole schedule, once for each choice and once what was typed is left; never with half of one. */
  readonly commit: (value: S) => void;
}

/** When lights are on, where each change counts at once. */
export function ScheduleControl({ label, hint, disabled = false, value, commit }: ControlProps<Schedule>) {
  const [draft, setDraft] = useState({ schedule: value, of: value });
  // A schedule that did not come from here (undo, another person) replaces what was typed.
  const schedule = JSON.stringify(draft.of) === JSON.stringify(value) ? draft.schedule : value;
  const settle = (next: Schedule) => {
    if (!isSchedule(next) || JSON.stringify(next) === JSON.stringify(value)) return;
    setDraft({ schedule: next, of: next });
    commit(next);
  };
  return (
    <fieldset className={styles.schedule}>
      <legend className={form.choiceLegend}>{label}</legend>
      {hint && <span className={form.hint}>{hint}</span>}
      <ScheduleInputs
        value={schedule}
        onChange={(next, settled) => {
          setDraft({ schedule: next, of: value });
          if (settled) settle(next);
        }}
        onSettle={() => settle(schedule)}
        disabled={disabled}
      />
    </fieldset>
  );
}

interface OwnProps extends ControlProps<Schedule | null> {
  /** What is in force where there is none of its own. */
  readonly usual: Schedule;
  /** What that is called: "As the plan". */
  readonly usualLabel: string;
}

/** A schedule of its own, or the one that is usual there (null). */
export function OwnScheduleControl({ usual, usualLabel, ...rest }: OwnProps) {
  const { label, hint, disabled, value, commit } = rest;
  return (
    <div className={styles.own}>
      <Choice
        label={label}
        hint={hint}
        disabled={disabled}
        options={[
          { value: 'usual', label: usualLabel },
          { value: 'own', label: 'Its own' },
        ]}
        value={value === null ? 'usual' : 'own'}
        onChange={(choice) => commit(choice === 'own' ? usual : null)}
      />
      {value === null ? (
        <p className={styles.words}>{scheduleInWords(usual)}.</p>
      ) : (
        <ScheduleControl label="Its own times" value={value} commit={commit} disabled={disabled} />
      )}
    </div>
  );
}
