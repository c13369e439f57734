import { formatLength, meters, parseLength } from '@lampwright/geometry/units';
import { useState } from 'react';
import { type Control, type FieldPath, type FieldValues, useController } from 'react-hook-form';
import { useUnits } from '../../lib/units';
import { Field, type FieldText } from './field';
import styles from './form.module.css';

type LengthProps<In extends FieldValues, Out> = FieldText & {
  readonly control: Control<In, unknown, Out>;
  readonly name: FieldPath<In>;
  readonly disabled?: boolean;
};

/** A length, typed and shown in the person's units, kept in metres; null when empty. */
export function LengthField<In extends FieldValues, Out>({
  control,
  name,
  label,
  hint,
  optional,
  disabled,
}: LengthProps<In, Out>) {
  const units = useUnits();
  const { field, fieldState } = useController({ control, name });
  const asText = (value: unknown): string =>
    typeof value === 'number' && Number.isFinite(value)
      ? formatLength(meters(value), { system: units, precision: 'half-inch' })
      : '';
  const [typed, setTyped] = useState({ text: asText(field.value), means: field.value as unknown, fault: '' });
  // A value that did not come from this field (a reset) replaces what was typed.
  const own = Object.is(typed.means, field.value);
  const text = own ? typed.text : asText(field.value);

  const read = (next: string) => {
    if (next.trim() === '') {
      setTyped({ text: next, means: null, fault: '' });
      return field.onChange(null);
    }
    const parsed = parseLength(next, { preferred: units });
    const means = parsed.ok ? parsed.meters : Number.NaN;
    setTyped({ text: next, means, fault: parsed.ok ? '' : parsed.message });
    field.onChange(means);
  };

  const fault = own && typed.fault !== '' && fieldState.error ? typed.fault : fieldState.error?.message;
  return (
    <Field label={label} hint={hint} optional={optional} error={fault}>
      {(ids) => (
        <span className={styles.control}>
          <input
            {...ids}
            ref={field.ref}
            name={name}
            type="text"
            autoComplete="off"
            className={`${styles.input} ${styles.number}`}
            disabled={disabled}
            value={text}
            onBlur={field.onBlur}
            onChange={(event) => read(event.target.value)}
          />
          <span className={styles.unit}>{units === 'imperial' ? 'ft in' : 'm'}</span>
        </span>
      )}
    </Field>
  );
}
