import { useFieldArray } from 'react-hook-form';
import { Button } from '../../components/button';
import { CheckField, FieldRow, NumberField, TextField } from '../../components/form';
import fieldStyles from '../../components/form/form.module.css';
import { PlusIcon } from '../../components/icons';
import styles from './book.module.css';
import type { BookForm } from './book-form';

/** Taxes by jurisdiction. A job takes the default one unless it says otherwise. */
export function TaxTable({ form }: { readonly form: BookForm }) {
  const { control, watch, setValue } = form;
  // The tax has an id of its own, which the list must not take for its keys.
  const { fields, append, remove } = useFieldArray({ control, name: 'taxes', keyName: 'key' });
  const usual = watch('defaultTaxId');
  const choose = (id: string | null) => setValue('defaultTaxId', id, { shouldDirty: true });
  return (
    <>
      {fields.length === 0 && (
        <p className={styles.lede}>
          No taxes yet. Until there is one, or a job is exempt, prices warn of it.
        </p>
      )}
      <ol className={styles.taxes}>
        {fields.map((tax, i) => (
          <li key={tax.key} className={styles.tax}>
            <FieldRow>
              <TextField control={control} name={`taxes.${i}.name`} label="Name" maxLength={60} />
              <TextField
                control={control}
                name={`taxes.${i}.jurisdiction`}
                label="Where it holds"
                maxLength={80}
              />
              <NumberField control={control} name={`taxes.${i}.percent`} label="Rate" unit="%" />
            </FieldRow>
            <div className={styles.taxFoot}>
              <CheckField control={control} name={`taxes.${i}.onMaterials`} label="On materials" />
              <CheckField control={control} name={`taxes.${i}.onLabour`} label="On labour" />
              <label className={fieldStyles.check}>
                <input
                  type="radio"
                  name="default-tax"
                  className={fieldStyles.checkBox}
                  checked={usual === tax.id}
                  onChange={() => choose(tax.id)}
                />
                <span>The default</span>
              </label>
              <Button
                kind="bare"
                aria-label={`Remove ${watch(`taxes.${i}.name`) || 'this tax'}`}
                onClick={() => {
                  if (usual === tax.id) choose(null);
                  remove(i);
                }}
              >
                Remove
              </Button>
            </div>
          </li>
        ))}
      </ol>
      {fields.length < 30 && (
        <div>
          <Button
            onClick={() => {
              const id = crypto.randomUUID();
              append({
                id,
                name: 'Sales tax',
                jurisdiction: '',
                percent: 0,
                onMaterials: true,
                onLabour: false,
              });
              if (fields.length === 0) choose(id);
            }}
          >
            <PlusIcon />
            Add a tax
          </Button>
        </div>
      )}
    </>
  );
}
