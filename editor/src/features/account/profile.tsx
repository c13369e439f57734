import { z } from 'zod';
import { Choice, Form, TextField, useZodForm } from '../../components/form';
import { showProblem, showToast } from '../../components/toast';
import { sentenceOf } from '../../lib/api/client';
import { themeSchema, unitsSchema, useMe } from '../../lib/me';
import styles from './account.module.css';
import { type AccountEdit, useEditAccount } from './api';

const nameSchema = z.object({ name: z.string().trim().min(1).max(120) });

export function NameForm() {
  const me = useMe();
  const edit = useEditAccount();
  const form = useZodForm(nameSchema, { defaultValues: { name: me.user.name } });
  return (
    <Form
      form={form}
      label="Your name"
      submitLabel="Save the name"
      onSubmit={async (values) => {
        await edit.mutateAsync(values);
        form.reset(values);
        showToast({ message: 'Your name is saved.' });
      }}
    >
      <TextField control={form.control} name="name" label="Name" autoComplete="name" maxLength={120} />
    </Form>
  );
}

/** Choices that take effect at once. */
export function Preferences() {
  const me = useMe();
  const edit = useEditAccount();
  const { units, theme } = me.user.preferences;
  const change = (preferences: AccountEdit['preferences']) =>
    edit.mutate({ preferences }, { onError: (error) => void showProblem(sentenceOf(error)) });
  return (
    <div className={styles.stack}>
      <Choice
        label="Lengths"
        hint="How you read and type them. Both can be typed everywhere."
        options={[
          { value: 'imperial', label: 'Feet and inches' },
          { value: 'metric', label: 'Metres' },
        ]}
        value={units}
        onChange={(value) => change({ units: unitsSchema.parse(value) })}
      />
      <Choice
        label="Appearance"
        options={[
          { value: 'system', label: 'As the device' },
          { value: 'light', label: 'Light' },
          { value: 'dark', label: 'Dark' },
        ]}
        value={theme}
        onChange={(value) => change({ theme: themeSchema.parse(value) })}
      />
    </div>
  );
}
