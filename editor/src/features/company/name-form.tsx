import { z } from 'zod';
import { Form, SelectField, TextField, useZodForm } from '../../components/form';
import { showToast } from '../../components/toast';
import { type Region, regionCodes, regions } from '../../lib/regions';
import { type Company, useEditCompany } from './api';

const schema = z.object({ name: z.string().trim().min(1).max(120), region: z.enum(regionCodes) });

export function NameForm({ company }: { company: Company }) {
  const edit = useEditCompany();
  const start: { name: string; region: Region } = { name: company.name, region: company.region };
  const form = useZodForm(schema, { defaultValues: start });
  return (
    <Form
      form={form}
      label="Name and region"
      submitLabel="Save name and region"
      onSubmit={async (values) => {
        await edit.mutateAsync(values);
        form.reset(values);
        showToast({ message: 'Name and region are saved.' });
      }}
    >
      <TextField control={form.control} name="name" label="Company" maxLength={120} />
      <SelectField
        control={form.control}
        name="region"
        label="Where you work"
        hint="Words, volts and rules follow. Working values below that you never changed change with it."
        options={regions}
      />
    </Form>
  );
}
