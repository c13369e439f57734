import { useState } from 'react';
import { z } from 'zod';
import { Button } from '../../components/button';
import { Dialog } from '../../components/dialog';
import { Form, PasswordField, useZodForm } from '../../components/form';
import { showToast } from '../../components/toast';
import styles from './account.module.css';
import { useDeleteAccount } from './api';

const schema = z.object({ password: z.string().min(1) });

export function DeleteAccount() {
  const [open, setOpen] = useState(false);
  return (
    <>
      <p className={styles.body}>
        <Button onClick={() => setOpen(true)}>Delete your account…</Button>
      </p>
      <Dialog
        open={open}
        onOpenChange={setOpen}
        title="Delete your account?"
        lede="This cannot be undone. Your name and address are removed; what you made for a company stays with it, signed by a former member."
      >
        <DeleteForm />
      </Dialog>
    </>
  );
}

function DeleteForm() {
  const remove = useDeleteAccount();
  const form = useZodForm(schema, { defaultValues: { password: '' } });
  return (
    <Form
      form={form}
      label="Delete your account"
      submitLabel="Delete my account"
      onSubmit={async ({ password }) => {
        await remove.mutateAsync(password);
        showToast({ message: 'Your account is deleted.' });
      }}
    >
      <PasswordField
        control={form.control}
        name="password"
        label="Your password"
        autoComplete="current-password"
      />
    </Form>
  );
}
