/** The queues, and what a job in each carries. Payloads name rows; they never hold personal data. */
export interface QueuePayloads {
  /** Send one row of mail_messages. */
  'mail.send': { readonly messageId: string };
  /** Make the stored image of an uploaded sheet. */
  'sheet.process': { readonly companyId: string; readonly sheetId: string };
  /** Delete what a removed job, sheet or company left in object storage. */
  'storage.delete': { readonly prefix: string };
  /** Recompute the stored summary of a plan. */
  'plan.summarise': { readonly companyId: string; readonly jobId: string };
  /** Keep a revision's pictures and make its PDF; send it if that was asked for. */
  'proposal.prepare': { readonly companyId: string; readonly revisionId: string };
  /** Remind somebody who has not answered; does nothing if they have by then. */
  'proposal.remind': { readonly companyId: string; readonly linkId: string; readonly revisionId: string };
  /** Make the signed PDF of an approval and mail it to both sides. */
  'approval.sign': { readonly companyId: string; readonly approvalId: string };
  /** Make the PDF of an invoice, receipt or note of a refund, and mail it. */
  'money-document.make': { readonly companyId: string; readonly documentId: string };
  /** Have the card service send a refund. */
  'card-refund.send': { readonly companyId: string; readonly refundId: string };
  /** End a checkout that nobody should pay any more. */
  'card-checkout.end': { readonly companyId: string; readonly paymentId: string };
}
export type QueueName = keyof QueuePayloads;

interface QueueSettings {
  /** `short`: at most one waiting job a singleton key; further ones are dropped as already asked for. */
  readonly policy: 'standard' | 'short';
  readonly retryLimit: number;
  readonly retryDelay: number;
  readonly retryBackoff: boolean;
  /** A job that a dead worker held is taken up again after this long. */
  readonly expireInSeconds: number;
}

/** Papers are made and mailed by patient tries: a PDF takes seconds, storage may be away for minutes. */
const paper: QueueSettings = {
  policy: 'standard',
  retryLimit: 8,
  retryDelay: 3,
  retryBackoff: true,
  expireInSeconds: 180,
};

export const queues: Readonly<Record<QueueName, QueueSettings>> = {
  'mail.send': { policy: 'standard', retryLimit: 12, retryDelay: 5, retryBackoff: true, expireInSeconds: 60 },
  'sheet.process': {
    policy: 'standard',
    retryLimit: 2,
    retryDelay: 1,
    retryBackoff: false,
    expireInSeconds: 150,
  },
  'storage.delete': {
    policy: 'standard',
    retryLimit: 12,
    retryDelay: 10,
    retryBackoff: true,
    expireInSeconds: 300,
  },
  'plan.summarise': {
    policy: 'short',
    retryLimit: 5,
    retryDelay: 2,
    retryBackoff: true,
    expireInSeconds: 60,
  },
  'proposal.prepare': paper,
  'proposal.remind': paper,
  'approval.sign': paper,
  'money-document.make': paper,
  'card-refund.send': { ...paper, retryLimit: 12, retryDelay: 5 },
  'card-checkout.end': { ...paper, retryLimit: 12, retryDelay: 5 },
};
