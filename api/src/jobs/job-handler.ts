import type { QueueName, QueuePayloads } from '../ports/queue/queues.js';

/** Handles the jobs of one queue. May be called again for a job it did before: it must do it once. */
export interface JobHandler<N extends QueueName = QueueName> {
  readonly queue: N;
  handle(data: QueuePayloads[N]): Promise<void>;
}

/** The handlers of this process, collected under this token. */
export const JOB_HANDLERS = Symbol('job-handlers');
