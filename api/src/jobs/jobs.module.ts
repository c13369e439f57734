import { Inject, Module, type OnApplicationBootstrap } from '@nestjs/common';
import { Queue } from '../ports/queue/queue.js';
import { JOB_HANDLERS, type JobHandler } from './job-handler.js';
import { SendMail } from './mail.js';

/** Handler classes of the worker; add a new one here. */
const handlers: (new (...parts: never[]) => JobHandler)[] = [SendMail];

@Module({
  providers: [
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
