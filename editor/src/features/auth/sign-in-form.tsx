import { Form, PasswordField, TextField, useZodForm } from '../../components/form';
import { signInSchema, useSignIn } from './api';

export function SignInForm({ onDone }: { onDone: () => void }) {
  const signIn = useSignIn();
  const form = useZodForm(signInSchema, { defaultValues: { email: '', password: '' } });
  return (
    <Form
      form={form}
      label="Sign in"
      submitLabel="Sign in"
      wideButton
      onSubmit={async (values) => {
        await signIn.mutateAsync(values);
        onDone();
      }}
    >
      <TextField control={form.control} name="email" label="E-mail" type="email" autoComplete="username" />
      <PasswordField
        control={form.control}
        name="password"
        label="Password"
        autoComplete="current-password"
      />
    </Form>
  );
}
