import { type JobPricing, moneyInput, parseMoney, type StageAmount } from '@lampwright/geometry/price';
import type { ReactNode } from 'react';
import { Button } from '../../components/button';
import { Choice, Field } from '../../components/form';
import form from '../../components/form/form.module.css';
import { Section } from '../../components/page';
import { Select } from '../../components/select';
import { type MoneyManner, moneyOf } from '../../lib/money';
import type { CatalogueEntry, QuoteAnswer } from './api';
import { CommitField } from './commit-field';
import type { PlanTransformer } from './fixtures-of';
import { readPercent, readWhole } from './read-number';
import { StagesEditor } from './stages-editor';
import { type Edit, setControl, setTerms } from './store/edits';
import styles from './terms.module.css';
import { dueLabel, numberText, percentText } from './words';

interface TermsPartProps {
  readonly pricing: JobPricing;
  /** What the company offers and does by default. */
  readonly usual: QuoteAnswer['terms'];
  readonly catalogue: readonly CatalogueEntry[];
  readonly transformers: readonly PlanTransformer[];
  /** Of the combination as offered. */
  readonly stages: readonly StageAmount[];
  readonly editable: boolean;
  readonly manner: MoneyManner;
  readonly edit: (label: string, edit: Edit) => void;
}

/** What the whole job is priced under: tax, discount, payment, and parts that the plan does not show. */
export function TermsPart(props: TermsPartProps) {
  return (
    <div className={styles.terms}>
      <Section title="Tax and discount">
        <div className={styles.fields}>
          <TaxFields {...props} />
          <DiscountFields {...props} />
        </div>
      </Section>
      <Section title="Payment">
        <div className={styles.fields}>
          <Payment {...props} />
        </div>
      </Section>
      <Section title="Controls and aiming">
        <div className={styles.fields}>
          <Controls {...props} />
          <Visits {...props} />
        </div>
      </Section>
    </div>
  );
}

const Plain = ({
  label,
  hint,
  children,
}: {
  label: string;
  hint?: string;
  children: (id: string) => ReactNode;
}) => (
  <Field label={label} hint={hint} error={undefined}>
    {({ id }) => children(id)}
  </Field>
);

function TaxFields({ pricing, usual, editable, manner, edit }: TermsPartProps) {
  const own = usual.taxes.find(({ id }) => id === usual.defaultTaxId);
  const gone = pricing.taxId !== null && !usual.taxes.some(({ id }) => id === pricing.taxId);
  const nameOf = (tax: TermsPartProps['usual']['taxes'][number]) =>
    `${tax.name} ${percentText(tax.percent, manner.locale)}${tax.jurisdiction ? `, ${tax.jurisdiction}` : ''}`;
  return (
    <>
      <Plain label="Tax">
        {(id) => (
          <Select
            id={id}
            value={pricing.taxId ?? ''}
            disabled={!editable || pricing.taxExempt}
            onChange={(event) =>
              edit('Tax', setTerms({ taxId: event.target.value === '' ? null : event.target.value }))
            }
          >
            <option value="">{own ? `The company’s: ${nameOf(own)}` : 'The company’s: none set'}</option>
            {usual.taxes.map((tax) => (
              <option key={tax.id} value={tax.id}>
                {nameOf(tax)}
              </option>
            ))}
            {gone && <option value={pricing.taxId ?? ''}>A tax that is no longer in the price book</option>}
          </Select>
        )}
      </Plain>
      <label className={form.check}>
        <input
          type="checkbox"
          className={form.checkBox}
          checked={pricing.taxExempt}
          disabled={!editable}
          onChange={(event) => edit('Tax', setTerms({ taxExempt: event.target.checked }))}
        />
        <span className={form.checkText}>This job is exempt from tax</span>
      </label>
    </>
  );
}

function DiscountFields({ pricing: { discount }, editable, manner, edit }: TermsPartProps) {
  const name = discount.kind === 'none' ? 'Discount' : discount.name;
  const set = (next: JobPricing['discount']) => edit('Discount', setTerms({ discount: next }));
  return (
    <>
      <Choice
        label="Discount"
        value={discount.kind}
        disabled={!editable}
        options={[
          { value: 'none', label: 'None' },
          { value: 'percent', label: 'A share' },
          { value: 'amount', label: 'An amount' },
        ]}
        onChange={(kind) => {
          if (kind === 'none') set({ kind: 'none' });
          else if (kind === 'percent') set({ kind: 'percent', percent: 0, name });
          else set({ kind: 'amount', amountMinor: 0, name });
        }}
      />
      {discount.kind !== 'none' && (
        <div className={styles.pair}>
          {discount.kind === 'percent' ? (
            <CommitField
              label="Share"
              numeric
              unit="% of the lines"
              value={numberText(discount.percent, manner.locale, 4)}
              disabled={!editable}
              onCommit={(text) => {
                const percent = readPercent(text, 100);
                if (percent === null) return 'Please write a share from 0 to 100 %.';
                set({ ...discount, percent });
                return null;
              }}
            />
          ) : (
            <CommitField
              label="Amount"
              numeric
              unit={manner.currency}
              value={moneyInput(discount.amountMinor, manner.currency, manner.locale)}
              disabled={!editable}
              onCommit={(text) => {
                const amountMinor = parseMoney(text, manner.currency, manner.locale);
                if (amountMinor === null)
                  return `Please write an amount, such as ${moneyInput(124_000, manner.currency, manner.locale)}.`;
                set({ ...discount, amountMinor });
                return null;
              }}
            />
          )}
          <CommitField
            label="Name on the proposal"
            value={discount.name}
            maxLength={60}
            placeholder="Discount"
            disabled={!editable}
            onCommit={(text) => {
              set({ ...discount, name: text.trim() });
              return null;
            }}
          />
        </div>
      )}
    </>
  );
}

function Payment({ pricing, usual, stages, editable, manner, edit }: TermsPartProps) {
  const money = moneyOf(manner);
  const { percent, amountMinor } = usual.depositCap;
  const cap = [
    percent === null ? null : `${percentText(percent, manner.locale)} of the total`,
    amountMinor === null ? null : money(amountMinor),
  ].filter((part) => part !== null);
  return (
    <>
      <Choice
        label="Payment stages"
        value={pricing.stages === null ? 'company' : 'own'}
        disabled={!editable}
        options={[
          { value: 'company', label: 'The company’s' },
          { value: 'own', label: 'This job’s own' },
        ]}
        onChange={(value) =>
          edit('Payment stages', setTerms({ stages: value === 'own' ? [...usual.stages] : null }))
        }
      />
      {pricing.stages === null ? (
        <ul className={styles.stages}>
          {stages.map((stage) => (
            <li key={stage.id}>
              {stage.name}, {dueLabel(stage.due)}
              {stage.percent !== null && `: ${percentText(stage.percent, manner.locale)}`}
            </li>
          ))}
        </ul>
      ) : (
        <StagesEditor
          stages={pricing.stages}
          locale={manner.locale}
          disabled={!editable}
          onChange={(next) => edit('Payment stages', setTerms({ stages: next }))}
        />
      )}
      {cap.length > 0 && (
        <p className={form.hint}>
          Before work begins at most {cap.join(' or ')}
          {cap.length > 1 && ', whichever is less,'} may be asked for. What is over it comes with the next
          stage.
        </p>
      )}
    </>
  );
}

function Controls({ pricing, usual, catalogue, transformers, editable, edit }: TermsPartProps) {
  const controls = catalogue.filter(({ item }) => item.category === 'control');
  const companys = controls.find(({ id }) => id === usual.controlItemId)?.item.name ?? 'none';
  if (transformers.length === 0)
    return <p className="quiet">There is no transformer on the plan yet, so there is nothing to control.</p>;
  return (
    <>
      {transformers.map(({ id: transformerId, label, item }) => {
        const own = Object.hasOwn(pricing.controls, transformerId)
          ? pricing.controls[transformerId]
          : undefined;
        const listed = own === undefined || own === null || controls.some(({ id }) => id === own);
        return (
          <Plain key={transformerId} label={`Control of ${label}`} hint={item}>
            {(id) => (
              <Select
                id={id}
                disabled={!editable}
                value={own === undefined ? 'company' : (own ?? 'none')}
                onChange={(event) => {
                  const { value } = event.target;
                  edit(
                    `Control of ${label}`,
                    setControl(
                      transformerId,
                      value === 'company' ? undefined : value === 'none' ? null : value,
                    ),
                  );
                }}
              >
                <option value="company">The company’s: {companys}</option>
                <option value="none">None</option>
                {controls.map((entry) => (
                  <option key={entry.id} value={entry.id}>
                    {entry.item.name}
                  </option>
                ))}
                {!listed && <option value={own ?? ''}>An item that is no longer in the catalogue</option>}
              </Select>
            )}
          </Plain>
        );
      })}
    </>
  );
}

function Visits({ pricing, usual, editable, edit }: TermsPartProps) {
  const { aimingVisits } = pricing;
  return (
    <div className={styles.visits}>
      <CommitField
        label="Aiming visits"
        hint="After dark, to aim and adjust."
        numeric
        value={String(aimingVisits ?? usual.aimingVisits)}
        disabled={!editable}
        onCommit={(text) => {
          const visits = readWhole(text, 20);
          if (visits === null) return 'Please write a whole number from 0 to 20.';
          edit('Aiming visits', setTerms({ aimingVisits: visits }));
          return null;
        }}
      />
      {aimingVisits !== null && editable && (
        <Button onClick={() => edit('Aiming visits', setTerms({ aimingVisits: null }))}>
          As the company does: {usual.aimingVisits}
        </Button>
      )}
    </div>
  );
}
