import { type ComponentProps, useState } from 'react';
import { type Control, type FieldPath, type FieldValues, useController } from 'react-hook-form';
import { Select } from '../select';
import { Field, type FieldText } from './field';
import styles from './form.module.css';

/** Ties a control to a field of the form. */
interface Bound<In extends FieldValues, Out> {
  readonly control: Control<In, unknown, Out>;
  readonly name: FieldPath<In>;
  readonly disabled?: boolean;
}

type TextProps<In extends FieldValues, Out> = Bound<In, Out> &
  FieldText &
  Pick<ComponentProps<'input'>, 'autoComplete' | 'autoFocus' | 'placeholder' | 'inputMode' | 'list'> & {
    readonly type?: 'text' | 'email' | 'tel' | 'search' | 'date';
    readonly maxLength?: number;
    /** An emptied field counts as null rather than as an empty text. */
    readonly emptyAsNull?: boolean;
  };

export function TextField<In extends FieldValues, Out>({
  control,
  name,
  label,
  hint,
  optional,
  type = 'text',
  disabled,
  emptyAsNull = false,
  ...input
}: TextProps<In, Out>) {
  const { field, fieldState } = useController({ control, name });
  return (
    <Field label={label} hint={hint} optional={optional} error={fieldState.error?.message}>
      {(ids) => (
        <input
          {...ids}
          {...input}
          ref={field.ref}
          name={name}
          type={type}
          className={styles.input}
          disabled={disabled}
          value={field.value ?? ''}
          onBlur={field.onBlur}
          onChange={(event) =>
            field.onChange(emptyAsNull && event.target.value === '' ? null : event.target.value)
          }
        />
      )}
    </Field>
  );
}

type PasswordProps<In extends FieldValues, Out> = Bound<In, Out> &
  FieldText & { readonly autoComplete: 'current-password' | 'new-password' };

export function PasswordField<In extends FieldValues, Out>({
  control,
  name,
  label,
  hint,
  autoComplete,
}: PasswordProps<In, Out>) {
  const [shown, setShown] = useState(false);
  const { field, fieldState } = useController({ control, name });
  return (
    <Field label={label} hint={hint} error={fieldState.error?.message}>
      {(ids) => (
        <span className={styles.control}>
          <input
            {...ids}
            ref={field.ref}
            name={name}
            type={shown ? 'text' : 'password'}
            autoComplete={autoComplete}
            autoCapitalize="none"
            spellCheck={false}
            className={styles.input}
            value={field.value ?? ''}
            onBlur={field.onBlur}
            onChange={field.onChange}
          />
          <button
            type="button"
            className={styles.reveal}
            aria-pressed={shown}
            aria-label={`Show ${label.toLowerCase()}`}
            onClick={() => setShown(!shown)}
          >
            {shown ? 'Hide' : 'Show'}
          </button>
        </span>
      )}
    </Field>
  );
}

/** Text to number: null for an empty field, NaN (which every schema refuses) for what is no number. */
export function parseNumber(text: string): number | null {
  const trimmed = text.trim().replace(',', '.');
  if (trimmed === '') return null;
  return /^[+-]?(\d+\.?\d*|\.\d+)$/.test(trimmed) ? Number(trimmed) : Number.NaN;
}

type NumberProps<In extends FieldValues, Out> = Bound<In, Out> &
  FieldText & {
    /** Written after the field, and read out with it. */
    readonly unit?: string;
    readonly placeholder?: string;
    /** Shown and typed in another unit than it is kept in. */
    readonly scale?: Scale;
  };

/** From the number that is kept to the one that is seen, and back. */
export interface Scale {
  readonly show: (kept: number) => number;
  readonly keep: (shown: number) => number;
}

export function NumberField<In extends FieldValues, Out>({
  control,
  name,
  label,
  hint,
  optional,
  unit,
  placeholder,
  disabled,
  scale,
}: NumberProps<In, Out>) {
  const { field, fieldState } = useController({ control, name });
  // What was typed is kept beside the number that it means: "1." must survive until the next digit.
  const asText = (value: unknown): string =>
    typeof value !== 'number' || !Number.isFinite(value) ? '' : String(scale ? scale.show(value) : value);
  const [typed, setTyped] = useState({ text: asText(field.value), means: field.value as unknown });
  // A value that did not come from this field (a reset) replaces what was typed.
  const text = Object.is(typed.means, field.value) ? typed.text : asText(field.value);
  return (
    <Field label={label} hint={hint} optional={optional} error={fieldState.error?.message}>
      {(ids) => (
        <span className={styles.control}>
          <input
            {...ids}
            ref={field.ref}
            name={name}
            type="text"
            inputMode="decimal"
            autoComplete="off"
            className={`${styles.input} ${styles.number}`}
            placeholder={placeholder}
            disabled={disabled}
            value={text}
            onBlur={field.onBlur}
            onChange={(event) => {
              const shown = parseNumber(event.target.value);
              const means = shown === null || !scale ? shown : scale.keep(shown);
              setTyped({ text: event.target.value, means });
              field.onChange(means);
            }}
          />
          {unit && <span className={styles.unit}>{unit}</span>}
        </span>
      )}
    </Field>
  );
}

export interface Option {
  readonly value: string;
  readonly label: string;
}

type SelectProps<In extends FieldValues, Out> = Bound<In, Out> &
  FieldText & {
    readonly options: readonly Option[];
    /** Offers nothing chosen, kept as null. */
    readonly none?: string;
  };

export function SelectField<In extends FieldValues, Out>({
  control,
  name,
  label,
  hint,
  optional,
  options,
  none,
  disabled,
}: SelectProps<In, Out>) {
  const { field, fieldState } = useController({ control, name });
  return (
    <Field label={label} hint={hint} optional={optional} error={fieldState.error?.message}>
      {(ids) => (
        <Select
          {...ids}
          ref={field.ref}
          name={name}
          disabled={disabled}
          value={field.value ?? ''}
          onBlur={field.onBlur}
          onChange={(event) => field.onChange(event.target.value === '' ? null : event.target.value)}
        >
          {none !== undefined && <option value="">{none}</option>}
          {options.map((option) => (
            <option key={option.value} value={option.value}>
              {option.label}
            </option>
          ))}
        </Select>
      )}
    </Field>
  );
}

export function AreaField<In extends FieldValues, Out>({
  control,
  name,
  label,
  hint,
  optional,
  disabled,
  rows = 4,
}: Bound<In, Out> & FieldText & { readonly rows?: number }) {
  const { field, fieldState } = useController({ control, name });
  return (
    <Field label={label} hint={hint} optional={optional} error={fieldState.error?.message}>
      {(ids) => (
        <textarea
          {...ids}
          ref={field.ref}
          name={name}
          rows={rows}
          className={styles.area}
          disabled={disabled}
          value={field.value ?? ''}
          onBlur={field.onBlur}
          onChange={field.onChange}
        />
      )}
    </Field>
  );
}
