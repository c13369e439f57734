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
};
