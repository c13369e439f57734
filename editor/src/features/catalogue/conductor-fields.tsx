import { FieldRow, NumberField, SelectField } from '../../components/form';
import { byResistance, gauges, sections } from './draft';
import type { ItemForm } from './light-fields';

const options = [...gauges, ...sections, { value: byResistance, label: 'Other, by resistance' }];

export function ConductorFields({ form, label }: { form: ItemForm; label: string }) {
  const { control } = form;
  return (
    <FieldRow>
      <SelectField control={control} name="gauge" label={label} options={options} />
      {form.watch('gauge') === byResistance && (
        <NumberField
          control={control}
          name="ohmsPerKm"
          label="Resistance of one conductor"
          hint="At 20 °C."
          unit="Ω/km"
        />
      )}
    </FieldRow>
  );
}
