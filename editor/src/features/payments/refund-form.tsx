import { useMemo } from 'react';
import { z } from 'zod';
import { Dialog } from '../../components/dialog';
import { AreaField, Form, TextField, useZodForm } from '../../components/form';
import { showToast } from '../../components/toast';
import { type MoneyManner, moneyOf } from '../../lib/money';
import { amountTyped, typedAmount } from './amount';
import { type Payment, useRefund } from './api';
import { refundHint } from './words';

interface RefundProps {
  readonly jobId: string;
  readonly payment: Payment;
  /** What of it can still be paid back. */
  readonly mostMinor: number;
  /** What the company owes after change orders; 0 where nothing. */
  readonly creditMinor: number;
  readonly manner: MoneyManner;
  readonly onClose: () => void;
}

export function RefundDialog(props: RefundProps) {
  const byCard = props.payment.method === 'card';
  return (
    <Dialog
      open
      onOpenChange={(open) => !open && props.onClose()}
      title="Pay money back"
      lede={
        byCard
          ? 'It goes back to the card that it came from. This can’t be taken back.'
          : 'Pay it back by hand as it came; this records that you did, and can’t be taken back.'
      }
    >
      <RefundForm {...props} />
    </Dialog>
  );
}

function RefundForm({ jobId, payment, mostMinor, creditMinor, manner, onClose }: RefundProps) {
  const refund = useRefund(jobId, payment.id);
  const schema = useMemo(
    () =>
      z.object({
        amountMinor: amountTyped(manner, mostMinor),
        reason: z.string().trim().min(3, { error: 'Please say why.' }).max(500),
      }),
    [manner, mostMinor],
  );
  const first = creditMinor > 0 ? Math.min(creditMinor, mostMinor) : mostMinor;
  const form = useZodForm(schema, {
    defaultValues: { amountMinor: typedAmount(first, manner), reason: '' },
  });
  const { control } = form;
  return (
    <Form
      form={form}
      label="Pay money back"
      submitLabel="Pay it back"
      onSubmit={async (values) => {
        await refund.mutateAsync(values);
        showToast({ message: `${moneyOf(manner)(values.amountMinor)} is being paid back.` });
        onClose();
      }}
    >
      <TextField
        control={control}
        name="amountMinor"
        label={`Amount, ${manner.currency}`}
        hint={refundHint(moneyOf(manner), mostMinor, creditMinor)}
        inputMode="decimal"
        autoComplete="off"
      />
      <AreaField
        control={control}
        name="reason"
        label="Why"
        hint="Stands on the note that the client gets."
        rows={3}
      />
    </Form>
  );
}
