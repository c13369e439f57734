import { type ItemPrice, itemPriceSchema } from '@lampwright/geometry/price';
import {
  CheckField,
  FieldRow,
  Form,
  NumberField,
  SelectField,
  TextField,
  useZodForm,
} from '../../components/form';
import { type MoneyManner, moneyOf } from '../../lib/money';
import { useSetItemPrice } from './api';
import { MoneyField } from './money-field';
import { unitLabel } from './words';

const units = (['each', 'foot', 'meter'] as const).map((value) => ({ value, label: unitLabel(value) }));

export const emptyPrice = (unit: ItemPrice['unit']): ItemPrice => ({
  costMinor: null,
  priceMinor: null,
  per: 1,
  unit,
  increment: 1,
  taxable: true,
  supplier: '',
  orderNumber: '',
});

interface ItemPriceFormProps {
  readonly itemId: string;
  readonly start: ItemPrice;
  readonly manner: MoneyManner;
  readonly seesCosts: boolean;
  readonly onSaved: () => void;
}

/** What one item costs and sells for. Each saved price is kept, with who set it and when. */
export function ItemPriceForm({ itemId, start, manner, seesCosts, onSaved }: ItemPriceFormProps) {
  const set = useSetItemPrice(itemId);
  const form = useZodForm(itemPriceSchema, { defaultValues: start });
  const { control } = form;
  const { per, unit, costMinor } = form.watch();
  const amount =
    per === 1 ? `for one ${unit === 'each' ? '' : unitLabel(unit)}`.trim() : `for ${per} ${plural(unit)}`;
  const one =
    costMinor !== null && Number.isFinite(costMinor) && per > 1
      ? `${moneyOf(manner)(Math.round(costMinor / per))} for one ${unit === 'each' ? '' : unitLabel(unit)}`.trim()
      : undefined;
  return (
    <Form
      form={form}
      label="Price"
      submitLabel="Save the price"
      serverName={(name) => name.replace(/^price\./, '')}
      onSubmit={async (price) => {
        await set.mutateAsync(price);
        form.reset(price);
        onSaved();
      }}
    >
      <FieldRow>
        <NumberField
          control={control}
          name="per"
          label="Priced by"
          hint="Such as 250 for a spool of 250 ft."
        />
        <SelectField control={control} name="unit" label="Of" options={units} />
      </FieldRow>
      <FieldRow>
        {seesCosts && (
          <MoneyField
            control={control}
            name="costMinor"
            label="Cost"
            hint={one ?? `What you pay ${amount}.`}
            optional
            manner={manner}
          />
        )}
        <MoneyField
          control={control}
          name="priceMinor"
          label="Price"
          hint={
            seesCosts ? 'Empty: from the cost, with overhead and markup.' : `What it sells for, ${amount}.`
          }
          optional
          manner={manner}
        />
      </FieldRow>
      <NumberField
        control={control}
        name="increment"
        label="Bought in multiples of"
        unit={plural(unit)}
        hint="Quantities are rounded up to it."
      />
      {seesCosts && (
        <FieldRow>
          <TextField control={control} name="supplier" label="Supplier" optional maxLength={120} />
          <TextField control={control} name="orderNumber" label="Order number" optional maxLength={60} />
        </FieldRow>
      )}
      <CheckField control={control} name="taxable" label="Taxable" />
    </Form>
  );
}

function plural(unit: ItemPrice['unit']): string {
  switch (unit) {
    case 'each':
      return 'pieces';
    case 'foot':
      return 'feet';
    case 'meter':
      return 'metres';
  }
}
