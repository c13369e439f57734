import { z } from 'zod';

const minor = z.number().int();
const positiveMinor = minor.min(1).max(1_000_000_000_000);

export const paymentSchema = z.strictObject({
  id: z.uuid(),
  dueId: z.uuid(),
  method: z.enum(['card', 'cheque', 'transfer', 'cash']),
  status: z.enum(['open', 'succeeded', 'failed', 'expired']),
  amountMinor: minor,
  refundedMinor: minor,
  receivedOn: z.iso.date().nullable(),
  note: z.string(),
  recordedBy: z.string(),
  createdAt: z.iso.datetime(),
  settledAt: z.iso.datetime().nullable(),
});
export const refundSchema = z.strictObject({
  id: z.uuid(),
  paymentId: z.uuid(),
  amountMinor: minor,
  reason: z.string(),
  status: z.enum(['pending', 'succeeded', 'failed']),
  createdAt: z.iso.datetime(),
});
export const dueSchema = z.strictObject({
  id: z.uuid(),
  name: z.string(),
  due: z.enum(['approval', 'start', 'finish']),
  amountMinor: minor,
  reducedMinor: minor,
  paidMinor: minor,
  outstandingMinor: minor,
  requestedAt: z.iso.datetime().nullable(),
});
export const moneyDocumentSchema = z.strictObject({
  id: z.uuid(),
  kind: z.enum(['invoice', 'receipt', 'refund']),
  number: z.number().int(),
  amountMinor: minor,
  createdAt: z.iso.datetime(),
  mailedAt: z.iso.datetime().nullable(),
  /** Null while it is being made. */
  pdfUrl: z.string().nullable(),
});
export const jobPaymentsSchema = z.strictObject({
  currency: z.string(),
  locale: z.string(),
  agreedMinor: minor,
  paidMinor: minor,
  outstandingMinor: minor,
  /** What change orders took off beyond all that was still to pay: to be refunded. */
  creditMinor: minor,
  dues: z.array(dueSchema),
  payments: z.array(paymentSchema),
  refunds: z.array(refundSchema),
  documents: z.array(moneyDocumentSchema),
});
export type JobPayments = z.infer<typeof jobPaymentsSchema>;

export const recordPaymentSchema = z.strictObject({
  method: z.enum(['cheque', 'transfer', 'cash']),
  amountMinor: positiveMinor,
  receivedOn: z.iso.date({ error: 'A date is written year-month-day, like 2026-05-31.' }),
  note: z.string().trim().max(300),
});
export type RecordPayment = z.infer<typeof recordPaymentSchema>;

export const newRefundSchema = z.strictObject({
  amountMinor: positiveMinor,
  reason: z.string().trim().min(3, { error: 'Please say why.' }).max(500),
});
export type NewRefund = z.infer<typeof newRefundSchema>;

export const paymentsExportQuerySchema = z.strictObject({
  from: z.iso.date().optional(),
  to: z.iso.date().optional(),
});
export type PaymentsExportQuery = z.infer<typeof paymentsExportQuerySchema>;
