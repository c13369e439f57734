import { type DynamicModule, Module } from '@nestjs/common';
import { ConfigModule } from './config/config.module.js';
import type { Env } from './config/env.js';
import { DatabaseModule } from './database/database.module.js';
import { JobsModule } from './jobs/jobs.module.js';
import { MailModule } from './ports/mail/mail.module.js';
import { CardServiceModule } from './ports/payments/card-service.module.js';
import { QueueModule } from './ports/queue/queue.module.js';
import { StorageModule } from './ports/storage/storage.module.js';

/** What the worker process is made of. */
@Module({})
export class WorkerModule {
  static with(env: Env): DynamicModule {
    return {
      module: WorkerModule,
      imports: [
        ConfigModule.with(env),
        DatabaseModule,
        QueueModule,
        StorageModule,
        MailModule,
        CardServiceModule,
        JobsModule,
      ],
    };
  }
}
