import { useMemo } from 'react';
import { z } from 'zod';
import { Dialog } from '../../components/dialog';
import { ChoiceField, FieldRow, Form, TextField, useZodForm } from '../../components/form';
import { showToast } from '../../components/toast';
import { type MoneyManner, moneyOf } from '../../lib/money';
import { amountTyped, typedAmount } from './amount';
import { type Due, useRecordPayment } from './api';

interface RecordProps {
  readonly jobId: string;
  readonly due: Due;
  readonly manner: MoneyManner;
  readonly onClose: () => void;
}

export function RecordDialog(props: RecordProps) {
  return (
    <Dialog
      open
      onOpenChange={(open) => !open && props.onClose()}
      title={`Record a payment: ${props.due.name}`}
      lede={`${moneyOf(props.manner)(props.due.outstandingMinor)} is still to pay. The client gets a receipt by mail.`}
    >
      <RecordForm {...props} />
    </Dialog>
  );
}

/** Today where the person is, as a field of dates wants it. */
export function today(now = new Date()): string {
  const two = (n: number) => String(n).padStart(2, '0');
  return `${now.getFullYear()}-${two(now.getMonth() + 1)}-${two(now.getDate())}`;
}

function RecordForm({ jobId, due, manner, onClose }: RecordProps) {
  const record = useRecordPayment(jobId, due.id);
  const schema = useMemo(
    () =>
      z.object({
        method: z.enum(['cheque', 'transfer', 'cash']),
        amountMinor: amountTyped(manner, due.outstandingMinor),
        receivedOn: z.iso.date({ error: 'Please choose the day it came in.' }),
        note: z.string().trim().max(300),
      }),
    [manner, due.outstandingMinor],
  );
  const form = useZodForm(schema, {
    defaultValues: {
      method: 'cheque',
      amountMinor: typedAmount(due.outstandingMinor, manner),
      receivedOn: today(),
      note: '',
    },
  });
  const { control } = form;
  return (
    <Form
      form={form}
      label="Record a payment"
      submitLabel="Record the payment"
      onSubmit={async (values) => {
        await record.mutateAsync(values);
        showToast({ message: `${moneyOf(manner)(values.amountMinor)} is recorded.` });
        onClose();
      }}
    >
      <ChoiceField
        control={control}
        name="method"
        label="How it came"
        options={[
          { value: 'cheque', label: 'Cheque' },
          { value: 'transfer', label: 'Transfer' },
          { value: 'cash', label: 'Cash' },
        ]}
      />
      <FieldRow>
        <TextField
          control={control}
          name="amountMinor"
          label={`Amount, ${manner.currency}`}
          inputMode="decimal"
          autoComplete="off"
        />
        <TextField control={control} name="receivedOn" label="Received on" type="date" />
      </FieldRow>
      <TextField
        control={control}
        name="note"
        label="Note"
        hint="Number of the cheque, reference of the transfer. For the company alone."
        maxLength={300}
        optional
      />
    </Form>
  );
}
