import { moneyInput, parseMoney } from '@lampwright/geometry/price';
import { useState } from 'react';
import { type Control, type FieldPath, type FieldValues, useController } from 'react-hook-form';
import { Field } from '../../components/form';
import form from '../../components/form/form.module.css';
import type { MoneyManner } from '../../lib/money';

interface MoneyFieldProps<In extends FieldValues, Out> {
  readonly control: Control<In, unknown, Out>;
  readonly name: FieldPath<In>;
  readonly label: string;
  readonly hint?: string;
  readonly optional?: boolean;
  readonly manner: MoneyManner;
  /** Written after the currency: "for each", "for 250 ft". */
  readonly unit?: string;
  readonly autoFocus?: boolean;
}

/** What an empty or unreadable amount counts as: null, and NaN, which every schema refuses. */
export function amountOf(text: string, { currency, locale }: MoneyManner): number | null {
  if (text.trim() === '') return null;
  return parseMoney(text, currency, locale) ?? Number.NaN;
}

/** Money typed in the company's manner ("1,240.00"), kept in whole minor units; null when empty. */
export function MoneyField<In extends FieldValues, Out>({
  control,
  name,
  label,
  hint,
  optional,
  manner,
  unit,
  autoFocus,
}: MoneyFieldProps<In, Out>) {
  const { field, fieldState } = useController({ control, name });
  const asText = (value: unknown): string =>
    typeof value === 'number' && Number.isFinite(value)
      ? moneyInput(value, manner.currency, manner.locale)
      : '';
  const [typed, setTyped] = useState({ text: asText(field.value), means: field.value as unknown });
  // A value that did not come from this field (a reset) replaces what was typed.
  const text = Object.is(typed.means, field.value) ? typed.text : asText(field.value);
  const unreadable = typeof field.value === 'number' && Number.isNaN(field.value);
  const fault = fieldState.error
    ? unreadable
      ? `Please write an amount, such as ${moneyInput(124_000, manner.currency, manner.locale)}.`
      : field.value === null
        ? 'Please fill in an amount.'
        : fieldState.error.message
    : undefined;
  return (
    <Field label={label} hint={hint} optional={optional} error={fault}>
      {(ids) => (
        <span className={form.control}>
          <input
            {...ids}
            ref={field.ref}
            name={name}
            type="text"
            inputMode="decimal"
            autoComplete="off"
            // biome-ignore lint/a11y/noAutofocus: the field that the person asked to edit.
            autoFocus={autoFocus}
            className={`${form.input} ${form.number}`}
            value={text}
            onBlur={() => {
              if (typeof field.value === 'number' && Number.isFinite(field.value))
                setTyped({ text: asText(field.value), means: field.value });
              field.onBlur();
            }}
            onChange={(event) => {
              const means = amountOf(event.target.value, manner);
              setTyped({ text: event.target.value, means });
              field.onChange(means);
            }}
          />
          <span className={form.unit}>{unit ? `${manner.currency} ${unit}` : manner.currency}</span>
        </span>
      )}
    </Field>
  );
}
