import { useFieldArray } from 'react-hook-form';
import { Button } from '../../components/button';
import { Dialog } from '../../components/dialog';
import { AreaField, FieldRow, Form, TextField, useZodForm } from '../../components/form';
import { CloseIcon, PlusIcon } from '../../components/icons';
import { showToast } from '../../components/toast';
import { type Revision, useSendRevision } from './api';
import styles from './proposal.module.css';
import { MOST_RECIPIENTS, type SendValues, sendSchema } from './send';
import { people } from './standing';

interface SendProps {
  readonly jobId: string;
  readonly revision: Revision;
  readonly first: SendValues;
  readonly open: boolean;
  readonly onOpenChange: (open: boolean) => void;
}

export function SendDialog(props: SendProps) {
  const { revision, open, onOpenChange } = props;
  return (
    <Dialog
      open={open}
      onOpenChange={onOpenChange}
      title={
        revision.changeOrder ? `Send change order ${revision.revision}` : `Send revision ${revision.revision}`
      }
      lede="Each of them gets a letter with a link of their own. Whoever has the link sees the proposal, without an account."
    >
      <SendForm {...props} />
    </Dialog>
  );
}

function SendForm({ jobId, revision, first, onOpenChange }: SendProps) {
  const send = useSendRevision(jobId);
  const form = useZodForm(sendSchema, { defaultValues: first });
  const { control } = form;
  const { fields, append, remove } = useFieldArray({ control, name: 'recipients' });
  return (
    <Form
      form={form}
      label="Send the proposal"
      submitLabel={`Send revision ${revision.revision}`}
      submitKind="lamp"
      onSubmit={async ({ recipients, message }) => {
        await send.mutateAsync({ revisionId: revision.id, recipients, message });
        showToast({
          message: `Sent to ${people(recipients.map(({ name, email }) => (name === '' ? email : name)))}.`,
        });
        onOpenChange(false);
      }}
    >
      {fields.map((field, i) => (
        <fieldset key={field.id} className={styles.recipient}>
          <legend className="visually-hidden">Recipient {i + 1}</legend>
          <FieldRow>
            <TextField
              control={control}
              name={`recipients.${i}.name`}
              label="Name"
              maxLength={120}
              autoComplete="off"
            />
            <TextField
              control={control}
              name={`recipients.${i}.email`}
              label="E-mail"
              type="email"
              maxLength={254}
              autoComplete="off"
            />
          </FieldRow>
          {fields.length > 1 && (
            <Button kind="bare" icon aria-label={`Leave recipient ${i + 1} out`} onClick={() => remove(i)}>
              <CloseIcon />
            </Button>
          )}
        </fieldset>
      ))}
      {fields.length < MOST_RECIPIENTS && (
        <span>
          <Button onClick={() => append({ name: '', email: '' })}>
            <PlusIcon />
            Somebody else as well
          </Button>
        </span>
      )}
      <AreaField
        control={control}
        name="message"
        label="Letter"
        hint="Below it stand the total, until when it holds, the link and the company’s name. The PDF comes with it."
        rows={9}
      />
    </Form>
  );
}
