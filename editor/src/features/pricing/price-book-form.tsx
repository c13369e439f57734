import { fixtureKinds } from '@lampwright/geometry/catalogue';
import { partUses, priceBookSchema } from '@lampwright/geometry/price';
import { useEffect, useState } from 'react';
import { useController } from 'react-hook-form';
import {
  CheckField,
  ChoiceField,
  FieldGroup,
  FieldRow,
  Form,
  NumberField,
  SelectField,
  useZodForm,
} from '../../components/form';
import { showToast } from '../../components/toast';
import type { MoneyManner } from '../../lib/money';
import { type CatalogueEntry, type PriceBookAnswer, useSaveBook } from './api';
import styles from './book.module.css';
import type { BookForm } from './book-form';
import { localesWith } from './locales';
import { MoneyField } from './money-field';
import { ProfitExample } from './profit-example';
import { StagesEditor } from './stages-editor';
import { TaxTable } from './tax-table';
import { kindLabel, partLabel } from './words';

interface PriceBookFormProps {
  readonly answer: PriceBookAnswer;
  readonly catalogue: readonly CatalogueEntry[];
}

const profits = [
  { value: 'markup', label: 'Markup on cost' },
  { value: 'margin', label: 'Margin of the price' },
] as const;

/** What the company's work costs and how its prices are made. Proposals that exist keep the prices they have. */
export function PriceBookForm({ answer, catalogue }: PriceBookFormProps) {
  const save = useSaveBook();
  const [at, setAt] = useState(answer);
  const form = useZodForm(priceBookSchema, { defaultValues: answer.book });
  const { control } = form;
  const { isDirty } = form.formState;

  // A newer book than the one that was opened replaces it, but for somebody who is at work on it.
  useEffect(() => {
    if (answer.version === at.version || isDirty) return;
    setAt(answer);
    form.reset(answer.book);
  }, [answer, at.version, isDirty, form]);

  const take = (saved: PriceBookAnswer) => {
    setAt(saved);
    form.reset(saved.book);
  };
  const manner: MoneyManner = { currency: at.currency, locale: form.watch('locale') };
  return (
    <Form
      form={form}
      label="Price book"
      submitLabel="Save the price book"
      serverName={(name) => name.replace(/^book\./, '')}
      onSubmit={async (book) => {
        const before = at.book;
        const saved = await save.mutateAsync({ baseVersion: at.version, book });
        take(saved);
        showToast({
          message: 'The price book is saved. Prices without a proposal follow it.',
          undo: async () => take(await save.mutateAsync({ baseVersion: saved.version, book: before })),
        });
      }}
    >
      <Rates form={form} manner={manner} />
      <FieldGroup legend="Overhead and profit">
        <NumberField
          control={control}
          name="overheadPercent"
          label="Overhead"
          hint="Rent, vehicles, insurance: on top of every cost, before profit."
          unit="% of cost"
        />
        <ChoiceField control={control} name="materials.by" label="Profit on materials" options={profits} />
        <NumberField control={control} name="materials.percent" label="On materials" unit="%" />
        <ChoiceField control={control} name="labour.by" label="Profit on labour" options={profits} />
        <NumberField control={control} name="labour.percent" label="On labour" unit="%" />
        <ProfitExample book={form.watch()} manner={manner} />
      </FieldGroup>
      <FieldGroup legend="Waste">
        <FieldRow>
          <NumberField
            control={control}
            name="cableWastePercent"
            label="Cable"
            hint="Bought beyond what is measured."
            unit="%"
          />
          <NumberField
            control={control}
            name="conduitWastePercent"
            label="Conduit"
            hint="Cut ends and bends."
            unit="%"
          />
        </FieldRow>
      </FieldGroup>
      <FieldGroup legend="Taxes">
        <TaxTable form={form} />
      </FieldGroup>
      <FieldGroup legend="Payment">
        <Stages form={form} />
        <FieldRow>
          <NumberField
            control={control}
            name="depositCap.percent"
            label="Cap before work, share"
            hint="Where the law sets one."
            unit="% of the total"
            optional
          />
          <MoneyField
            control={control}
            name="depositCap.amountMinor"
            label="Cap before work, amount"
            hint="The lesser of the two holds."
            optional
            manner={manner}
          />
        </FieldRow>
      </FieldGroup>
      <Parts form={form} catalogue={catalogue} />
      <FieldGroup legend="Proposals">
        <CheckField
          control={control}
          name="showLinePrices"
          label="Show the homeowner a price beside each line"
          hint="Otherwise one for each group."
        />
        <NumberField control={control} name="validDays" label="A proposal holds for" unit="days" />
        <SelectField
          control={control}
          name="locale"
          label="Money is written"
          options={localesWith(manner.locale, at.currency)}
        />
      </FieldGroup>
      <FieldGroup legend="Who sees costs">
        <CheckField
          control={control}
          name="designersSeeCosts"
          label="Designers see costs and margins"
          hint="Owners always do; crew and homeowners never."
        />
      </FieldGroup>
    </Form>
  );
}

/** A share or an amount of time is asked for by its own kind of work. */
function Rates({
  form: { control, watch },
  manner,
}: {
  readonly form: BookForm;
  readonly manner: MoneyManner;
}) {
  const unit = watch('rates.lengthUnit') === 'foot' ? 'a foot' : 'a metre';
  return (
    <>
      <FieldGroup legend="Placing and wiring one fixture">
        <p className={styles.lede}>What it costs you. Overhead and profit come on top.</p>
        <div className={styles.kinds}>
          {fixtureKinds.map((kind) => (
            <MoneyField
              key={kind}
              control={control}
              name={`rates.perFixture.${kind}`}
              label={kindLabel(kind)}
              manner={manner}
            />
          ))}
        </div>
      </FieldGroup>
      <FieldGroup legend="Other work">
        <ChoiceField
          control={control}
          name="rates.lengthUnit"
          label="Trenches are priced by the"
          options={[
            { value: 'foot', label: 'Foot' },
            { value: 'meter', label: 'Metre' },
          ]}
        />
        <FieldRow>
          <MoneyField
            control={control}
            name="rates.perTrenched"
            label="Trenched"
            unit={unit}
            manner={manner}
          />
          <MoneyField
            control={control}
            name="rates.perBored"
            label="Bored under paving"
            unit={unit}
            manner={manner}
          />
        </FieldRow>
        <FieldRow>
          <MoneyField control={control} name="rates.perTransformer" label="A transformer" manner={manner} />
          <MoneyField
            control={control}
            name="rates.perTreeMount"
            label="A light in a tree, on top"
            manner={manner}
          />
        </FieldRow>
        <FieldRow>
          <MoneyField control={control} name="rates.perAimingVisit" label="An aiming visit" manner={manner} />
          <NumberField control={control} name="rates.aimingVisits" label="Visits a job" />
        </FieldRow>
      </FieldGroup>
    </>
  );
}

function Stages({ form }: { readonly form: BookForm }) {
  const { field, fieldState } = useController({ control: form.control, name: 'stages' });
  const fault = fieldState.error?.message ?? fieldState.error?.root?.message;
  return (
    <div>
      <p className={styles.label}>Stages</p>
      <StagesEditor stages={field.value} locale={form.watch('locale')} onChange={field.onChange} />
      {fault && <p role="alert">{fault}</p>}
    </div>
  );
}

/** Parts that no plan shows: which of the catalogue's is taken. */
function Parts({
  form: { control },
  catalogue,
}: {
  readonly form: BookForm;
  readonly catalogue: readonly CatalogueEntry[];
}) {
  const controls = catalogue.flatMap(({ id, item }) =>
    item.category === 'control' ? [{ value: id, label: item.name }] : [],
  );
  return (
    <FieldGroup legend="Parts that the plan does not show">
      {partUses.map((use) => (
        <SelectField
          key={use}
          control={control}
          name={`parts.${use}`}
          label={partLabel(use)}
          none="The first in the catalogue"
          options={catalogue.flatMap(({ id, item }) =>
            item.category === 'part' && item.use === use ? [{ value: id, label: item.name }] : [],
          )}
        />
      ))}
      <SelectField
        control={control}
        name="controlItemId"
        label="Control of a transformer"
        hint="Where the job does not say otherwise."
        none="None"
        options={controls}
      />
    </FieldGroup>
  );
}
