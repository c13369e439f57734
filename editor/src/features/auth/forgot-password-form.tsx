import { useState } from 'react';
import { Form, TextField, useZodForm } from '../../components/form';
import { Note } from '../../components/states';
import { forgotSchema, useForgotPassword } from './api';

export function ForgotPasswordForm() {
  const forgot = useForgotPassword();
  const [sentTo, setSentTo] = useState<string | null>(null);
  const form = useZodForm(forgotSchema, { defaultValues: { email: '' } });
  if (sentTo !== null)
    return (
      <Note>
        If {sentTo} has an account, a link to choose a new password is on its way. Look in the junk folder
        too; the link works for a short time only.
      </Note>
    );
  return (
    <Form
      form={form}
      label="Forgotten password"
      submitLabel="Send the link"
      wideButton
      onSubmit={async (values) => {
        await forgot.mutateAsync(values);
        setSentTo(values.email);
      }}
    >
      <TextField control={form.control} name="email" label="E-mail" type="email" autoComplete="username" />
    </Form>
  );
}
