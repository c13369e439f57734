import { z } from 'zod';
import { Form, PasswordField, TextField, useZodForm } from '../../components/form';
import { type Company, useDeleteCompany } from './api';

const schema = z.object({ name: z.string().trim().min(1), password: z.string().min(1) });

/** Cannot be undone, so the name is typed and the password asked for. */
export function DeleteCompanyForm({ company, onDone }: { company: Company; onDone: () => void }) {
  const remove = useDeleteCompany();
  const form = useZodForm(schema, { defaultValues: { name: '', password: '' } });
  return (
    <Form
      form={form}
      label="Delete the company"
      submitLabel={`Delete ${company.name}`}
      onSubmit={async (proof) => {
        await remove.mutateAsync(proof);
        onDone();
      }}
    >
      <TextField
        control={form.control}
        name="name"
        label={`Type the name of the company`}
        hint={company.name}
        autoComplete="off"
      />
      <PasswordField
        control={form.control}
        name="password"
        label="Your password"
        autoComplete="current-password"
      />
    </Form>
  );
}
