import { useId } from 'react';
import { type Control, type FieldPath, type FieldValues, useController } from 'react-hook-form';
import type { FieldText } from './field';
import type { Option } from './fields';
import styles from './form.module.css';

interface Bound<In extends FieldValues, Out> {
  readonly control: Control<In, unknown, Out>;
  readonly name: FieldPath<In>;
  readonly disabled?: boolean;
}

export function CheckField<In extends FieldValues, Out>({
  control,
  name,
  label,
  hint,
  disabled,
}: Bound<In, Out> & FieldText) {
  const id = useId();
  const { field } = useController({ control, name });
  return (
    <div className={styles.check}>
      <input
        id={id}
        ref={field.ref}
        name={name}
        type="checkbox"
        className={styles.checkBox}
        disabled={disabled}
        checked={field.value === true}
        aria-describedby={hint ? `${id}-hint` : undefined}
        onBlur={field.onBlur}
        onChange={(event) => field.onChange(event.target.checked)}
      />
      <span className={styles.checkText}>
        <label htmlFor={id}>{label}</label>
        {hint && (
          <span id={`${id}-hint`} className={styles.hint}>
            {hint}
          </span>
        )}
      </span>
    </div>
  );
}

interface ChoiceProps {
  readonly label: string;
  readonly hint?: string;
  readonly options: readonly Option[];
  readonly value: string;
  readonly onChange: (value: string) => void;
  readonly error?: string;
  readonly disabled?: boolean;
}

/** A few choices side by side: radio buttons that look like one control. */
export function Choice({ label, hint, options, value, onChange, error, disabled }: ChoiceProps) {
  const id = useId();
  return (
    <fieldset className={styles.field} aria-describedby={hint ? `${id}-hint` : undefined} disabled={disabled}>
      <legend className={styles.choiceLegend}>{label}</legend>
      {hint && (
        <span id={`${id}-hint`} className={styles.hint}>
          {hint}
        </span>
      )}
      <div className={styles.choices}>
        {options.map((option) => (
          <label key={option.value} className={styles.choice}>
            <input
              type="radio"
              name={id}
              value={option.value}
              checked={value === option.value}
              onChange={() => onChange(option.value)}
            />
            {option.label}
          </label>
        ))}
      </div>
      {error && <span className={styles.error}>{error}</span>}
    </fieldset>
  );
}

export function ChoiceField<In extends FieldValues, Out>({
  control,
  name,
  label,
  hint,
  options,
  disabled,
}: Bound<In, Out> & { readonly label: string; readonly hint?: string; readonly options: readonly Option[] }) {
  const { field, fieldState } = useController({ control, name });
  return (
    <Choice
      label={label}
      hint={hint}
      options={options}
      value={field.value ?? ''}
      onChange={field.onChange}
      error={fieldState.error?.message}
      disabled={disabled}
    />
  );
}
