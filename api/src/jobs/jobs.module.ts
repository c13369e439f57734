import { Inject, Module, type OnApplicationBootstrap } from '@nestjs/common';
import { Decoder } from '../media/decoder.js';
import { PaymentsStoreModule } from '../modules/payments/payments-store.module.js';
import { PlanStoreModule } from '../modules/plans/plan-store.module.js';
import { ProposalsStoreModule } from '../modules/proposals/proposals-store.module.js';
import { ShareStoreModule } from '../modules/share/share-store.module.js';
import { SheetStoreModule } from '../modules/sheets/sheet-store.module.js';
import { Queue } from '../ports/queue/queue.js';
import { EndCardCheckout, SendCardRefund } from './card-service.js';
import { JOB_HANDLERS, type JobHandler } from './job-handler.js';
import { SendMail } from './mail.js';
import { MakeMoneyDocument } from './make-money-document.js';
import { PrepareProposal } from './prepare-proposal.js';
import { Remind } from './remind.js';
import { ProcessSheet } from './sheets.js';
import { SignApproval } from './sign-approval.js';
import { DeleteStored } from './storage.js';
import { SummarisePlan } from './summarise-plan.js';

/** Handler classes of the worker; add a new one here. */
const handlers: (new (...parts: never[]) => JobHandler)[] = [
  SendMail,
  ProcessSheet,
  DeleteStored,
  SummarisePlan,
  MakeMoneyDocument,
  PrepareProposal,
  Remind,
  SignApproval,
  SendCardRefund,
  EndCardCheckout,
];

@Module({
  imports: [SheetStoreModule, PlanStoreModule, PaymentsStoreModule, ProposalsStoreModule, ShareStoreModule],
  providers: [
    Decoder,
    ...handlers,
    {
      provide: JOB_HANDLERS,
      inject: handlers,
      useFactory: (...all: JobHandler[]) => all,
    },
  ],
})
export class JobsModule implements OnApplicationBootstrap {
  constructor(
    @Inject(Queue) private readonly queue: Queue,
    @Inject(JOB_HANDLERS) private readonly all: readonly JobHandler[],
  ) {}

  async onApplicationBootstrap(): Promise<void> {
    for (const handler of this.all) await this.queue.work(handler.queue, (data) => handler.handle(data));
  }
}
