import { Form, PasswordField, SelectField, TextField, useZodForm } from '../../components/form';
import { regions } from '../../lib/regions';
import { type SignUp, signUpSchema, useSignUp } from './api';

export function SignUpForm({ onDone }: { onDone: () => void }) {
  const signUp = useSignUp();
  const start: SignUp = { companyName: '', name: '', email: '', password: '', region: 'us' };
  const form = useZodForm(signUpSchema, { defaultValues: start });
  const { control } = form;
  return (
    <Form
      form={form}
      label="Create a company"
      submitLabel="Create the company"
      submitKind="lamp"
      wideButton
      onSubmit={async (values) => {
        await signUp.mutateAsync(values);
        onDone();
      }}
    >
      <TextField control={control} name="companyName" label="Company" autoComplete="organization" />
      <SelectField
        control={control}
        name="region"
        label="Where you work"
        hint="Sets volts, words and rules. Can be changed later."
        options={regions}
      />
      <TextField control={control} name="name" label="Your name" autoComplete="name" />
      <TextField control={control} name="email" label="E-mail" type="email" autoComplete="username" />
      <PasswordField
        control={control}
        name="password"
        label="Password"
        hint="At least 10 characters."
        autoComplete="new-password"
      />
    </Form>
  );
}
