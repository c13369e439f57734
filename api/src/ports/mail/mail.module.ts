import { Global, Inject, Module, type OnApplicationShutdown } from '@nestjs/common';
import { ENV } from '../../config/config.module.js';
import type { Env } from '../../config/env.js';
import { MailRepository } from './mail.repository.js';
import { Mailer } from './mailer.js';
import { Outbox } from './outbox.js';
import { SmtpMailer } from './smtp-mailer.js';

@Global()
@Module({
  providers: [
    { provide: Mailer, inject: [ENV], useFactory: (env: Env) => new SmtpMailer(env) },
    MailRepository,
    Outbox,
  ],
  exports: [Mailer, MailRepository, Outbox],
})
export class MailModule implements OnApplicationShutdown {
  constructor(@Inject(Mailer) private readonly mailer: Mailer) {}

  onApplicationShutdown(): void {
    this.mailer.close();
  }
}
