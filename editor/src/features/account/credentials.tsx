import { useState } from 'react';
import { z } from 'zod';
import { Form, PasswordField, TextField, useZodForm } from '../../components/form';
import { Note } from '../../components/states';
import { showToast } from '../../components/toast';
import { useMe } from '../../lib/me';
import { newPasswordSchema } from '../../lib/password';
import styles from './account.module.css';
import { useChangeEmail, useChangePassword } from './api';

const passwordSchema = z.object({ current: z.string().min(1), next: newPasswordSchema });

export function PasswordForm() {
  const change = useChangePassword();
  const empty = { current: '', next: '' };
  const form = useZodForm(passwordSchema, { defaultValues: empty });
  return (
    <Form
      form={form}
      label="Password"
      submitLabel="Change the password"
      onSubmit={async (values) => {
        await change.mutateAsync(values);
        form.reset(empty);
        showToast({ message: 'The password is changed. Other devices are signed out.' });
      }}
    >
      <PasswordField
        control={form.control}
        name="current"
        label="Present password"
        autoComplete="current-password"
      />
      <PasswordField
        control={form.control}
        name="next"
        label="New password"
        hint="At least 10 characters."
        autoComplete="new-password"
      />
    </Form>
  );
}

const emailSchema = z.object({ email: z.email().max(254), password: z.string().min(1) });

export function EmailForm() {
  const me = useMe();
  const change = useChangeEmail();
  const [sentTo, setSentTo] = useState<string | null>(null);
  const empty = { email: '', password: '' };
  const form = useZodForm(emailSchema, { defaultValues: empty });
  return (
    <div className={styles.stack}>
      <p>
        You sign in as <strong>{me.user.email}</strong>.
      </p>
      {sentTo !== null && (
        <Note>A link is on its way to {sentTo}. The address changes once you press the button there.</Note>
      )}
      <Form
        form={form}
        label="E-mail"
        submitLabel="Send a link to the new address"
        onSubmit={async (values) => {
          await change.mutateAsync(values);
          setSentTo(values.email);
          form.reset(empty);
        }}
      >
        <TextField control={form.control} name="email" label="New e-mail" type="email" autoComplete="email" />
        <PasswordField
          control={form.control}
          name="password"
          label="Your password"
          autoComplete="current-password"
        />
      </Form>
    </div>
  );
}
