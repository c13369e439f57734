import { type Group, type ManualLine, manualLineSchema } from '@lampwright/geometry/price';
import { Dialog } from '../../components/dialog';
import {
  CheckField,
  ChoiceField,
  FieldRow,
  Form,
  NumberField,
  SelectField,
  TextField,
  useZodForm,
} from '../../components/form';
import type { MoneyManner } from '../../lib/money';
import { MoneyField } from './money-field';
import { units } from './words';

interface ManualLineDialogProps {
  /** The line to begin with; null: the dialog is closed. */
  readonly line: ManualLine | null;
  readonly isNew: boolean;
  readonly groups: readonly Group[];
  readonly manner: MoneyManner;
  readonly seesCosts: boolean;
  readonly onSave: (line: ManualLine) => void;
  readonly onClose: () => void;
}

export function ManualLineDialog({ line, isNew, onClose, ...rest }: ManualLineDialogProps) {
  return (
    <Dialog
      open={line !== null}
      onOpenChange={(open) => !open && onClose()}
      title={isNew ? 'A line by hand' : 'Change the line'}
      lede="For what the plan does not show: a permit, a rented lift, an hour of somebody’s time."
    >
      {line && <ManualLineForm key={line.id} line={line} isNew={isNew} onClose={onClose} {...rest} />}
    </Dialog>
  );
}

export const newManualLine = (): ManualLine => ({
  id: crypto.randomUUID(),
  groupId: null,
  kind: 'material',
  name: '',
  quantity: 1,
  unit: 'each',
  costMinor: null,
  priceMinor: null,
  taxable: true,
});

function ManualLineForm({
  line,
  isNew,
  groups,
  manner,
  seesCosts,
  onSave,
  onClose,
}: Omit<ManualLineDialogProps, 'line'> & { readonly line: ManualLine }) {
  const form = useZodForm(manualLineSchema, { defaultValues: line });
  const { control } = form;
  return (
    <Form
      form={form}
      label="A line by hand"
      submitLabel={isNew ? 'Add the line' : 'Change the line'}
      onSubmit={async (value) => {
        onSave(value);
        onClose();
      }}
    >
      <TextField control={control} name="name" label="What it is" maxLength={160} autoFocus />
      <ChoiceField
        control={control}
        name="kind"
        label="It is"
        options={[
          { value: 'material', label: 'Material' },
          { value: 'labour', label: 'Labour' },
        ]}
      />
      {groups.length > 0 && (
        <SelectField
          control={control}
          name="groupId"
          label="In"
          none="Base, always in"
          options={groups.map(({ id, name }) => ({ value: id, label: name }))}
        />
      )}
      <FieldRow>
        <NumberField control={control} name="quantity" label="Quantity" />
        <SelectField control={control} name="unit" label="Counted by" options={units} />
      </FieldRow>
      <FieldRow>
        {seesCosts && (
          <MoneyField control={control} name="costMinor" label="Cost of one" optional manner={manner} />
        )}
        <MoneyField
          control={control}
          name="priceMinor"
          label="Price of one"
          hint={seesCosts ? 'Empty: from the cost, with overhead and markup.' : undefined}
          optional={seesCosts}
          manner={manner}
        />
      </FieldRow>
      <CheckField
        control={control}
        name="taxable"
        label="Taxable"
        hint="Where the job’s tax is on this kind of thing."
      />
    </Form>
  );
}
