import { Injectable } from '@nestjs/common';
import type { Actor } from '../../access/actor.js';
import { AppError } from '../../http/app-error.js';
import type { StoredFile } from '../../http/send-file.js';
import type { JobPayments, NewRefund, RecordPayment } from './payments.dto.js';

const notBuilt = () => new AppError(501, 'not-built', 'This is not built yet.');

@Injectable()
export class PaymentsService {
  async ofJob(_actor: Actor, _jobId: string): Promise<JobPayments> {
    throw notBuilt();
  }

  async request(_actor: Actor, _jobId: string, _dueId: string): Promise<JobPayments> {
    throw notBuilt();
  }

  async record(_actor: Actor, _jobId: string, _dueId: string, _input: RecordPayment): Promise<JobPayments> {
    throw notBuilt();
  }

  async refund(_actor: Actor, _jobId: string, _paymentId: string, _input: NewRefund): Promise<JobPayments> {
    throw notBuilt();
  }

  async documentPdf(_actor: Actor, _jobId: string, _documentId: string): Promise<StoredFile> {
    throw notBuilt();
  }
}
