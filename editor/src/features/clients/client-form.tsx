import { z } from 'zod';
import { Form, TextField, useZodForm } from '../../components/form';
import type { ClientFields } from './api';

const schema = z.object({
  name: z.string().trim().min(1).max(120),
  email: z.email().max(254).nullable(),
  phone: z.string().trim().max(40).nullable(),
});

interface ClientFormProps {
  readonly start: ClientFields;
  readonly label: string;
  readonly submitLabel: string;
  readonly onSubmit: (fields: ClientFields) => Promise<void>;
}

export function ClientForm({ start, label, submitLabel, onSubmit }: ClientFormProps) {
  const form = useZodForm(schema, { defaultValues: start });
  const { control } = form;
  return (
    <Form form={form} label={label} submitLabel={submitLabel} onSubmit={onSubmit}>
      <TextField control={control} name="name" label="Name" autoComplete="off" maxLength={120} />
      <TextField
        control={control}
        name="email"
        label="E-mail"
        type="email"
        autoComplete="off"
        emptyAsNull
        optional
      />
      <TextField
        control={control}
        name="phone"
        label="Phone"
        type="tel"
        autoComplete="off"
        maxLength={40}
        emptyAsNull
        optional
      />
    </Form>
  );
}
