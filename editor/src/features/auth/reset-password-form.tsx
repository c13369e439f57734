import { Form, PasswordField, useZodForm } from '../../components/form';
import { resetSchema, useResetPassword } from './api';

export function ResetPasswordForm({ token, onDone }: { token: string; onDone: () => void }) {
  const reset = useResetPassword();
  const form = useZodForm(resetSchema, { defaultValues: { password: '' } });
  return (
    <Form
      form={form}
      label="New password"
      submitLabel="Set the password"
      wideButton
      onSubmit={async ({ password }) => {
        await reset.mutateAsync({ token, password });
        onDone();
      }}
    >
      <PasswordField
        control={form.control}
        name="password"
        label="New password"
        hint="At least 10 characters."
        autoComplete="new-password"
      />
    </Form>
  );
}
