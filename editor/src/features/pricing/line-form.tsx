import { amountSchema, type LineOverride, quantitySchema } from '@lampwright/geometry/price';
import { type KeyboardEvent, useEffect } from 'react';
import { z } from 'zod';
import { Button } from '../../components/button';
import { FieldRow, NumberField, TextField, useZodForm } from '../../components/form';
import { type MoneyManner, moneyOf } from '../../lib/money';
import type { ShownLine } from './arrange';
import styles from './lines.module.css';
import { MoneyField } from './money-field';
import { quantityText } from './words';

const schema = z.object({
  quantity: quantitySchema,
  priceMinor: amountSchema.nullable(),
  note: z.string().trim().max(300),
});

interface LineFormProps {
  readonly line: ShownLine;
  /** What was put in place of the plan's before. */
  readonly own: LineOverride | null;
  readonly manner: MoneyManner;
  readonly onSave: (value: LineOverride | null) => void;
  readonly onClose: () => void;
}

/** Quantity and price of one line by hand, in its place in the table. An empty price follows the quantity. */
export function LineForm({ line, own, manner, onSave, onClose }: LineFormProps) {
  const planned = line.planned ?? { quantity: line.quantity, priceMinor: line.priceMinor };
  const form = useZodForm(schema, {
    defaultValues: { quantity: line.quantity, priceMinor: own?.priceMinor ?? null, note: own?.note ?? '' },
  });
  const { control, setFocus } = form;
  useEffect(() => setFocus('quantity', { shouldSelect: true }), [setFocus]);

  const submit = form.handleSubmit(({ quantity, priceMinor, note }) => {
    const value = { quantity: quantity === planned.quantity ? null : quantity, priceMinor, note };
    onSave(value.quantity === null && priceMinor === null ? null : value);
  });
  const onKeyDown = (event: KeyboardEvent) => {
    if (event.key !== 'Escape') return;
    event.stopPropagation();
    onClose();
  };
  const unit = line.unit === 'each' ? undefined : quantityText(2, line.unit, manner.locale).replace('2 ', '');
  return (
    <form
      className={styles.form}
      aria-label={`Change ${line.name}`}
      noValidate
      onSubmit={submit}
      onKeyDown={onKeyDown}
    >
      <p className={styles.formHead}>
        <strong>{line.name}</strong>
        <span className="quiet">
          {' '}
          · the plan says {quantityText(planned.quantity, line.unit, manner.locale)}
          {planned.priceMinor !== null && ` for ${moneyOf(manner)(planned.priceMinor)}`}
        </span>
      </p>
      <FieldRow>
        <NumberField control={control} name="quantity" label="Quantity" unit={unit} />
        <MoneyField
          control={control}
          name="priceMinor"
          label="Price of the line"
          hint="Empty: from the quantity."
          optional
          manner={manner}
        />
        <TextField
          control={control}
          name="note"
          label="Why"
          hint="For whoever reads it later."
          optional
          maxLength={300}
        />
      </FieldRow>
      <div className={styles.formFoot}>
        <Button type="submit" kind="strong">
          Change the line
        </Button>
        {own && <Button onClick={() => onSave(null)}>Back to the plan’s</Button>}
        <Button kind="bare" onClick={onClose}>
          Leave it
        </Button>
      </div>
    </form>
  );
}
