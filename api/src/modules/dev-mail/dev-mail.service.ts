import { Inject, Injectable } from '@nestjs/common';
import { ENV } from '../../config/config.module.js';
import { type Env, isLocal } from '../../config/env.js';
import { AppError, notFound } from '../../http/app-error.js';
import { type CaughtMail, caughtMailListSchema, caughtMailSchema } from '../../ports/mail/caught-mail.js';

const PATIENCE_MS = 3000;

/** Reads what the local catcher caught. Exists in local mode only. */
@Injectable()
export class DevMailService {
  private readonly catcher: string | undefined;

  constructor(@Inject(ENV) env: Env) {
    this.catcher = isLocal(env) ? env.MAIL_VIEWER_URL : undefined;
  }

  /** Newest first. */
  async list(): Promise<CaughtMail[]> {
    return caughtMailListSchema.parse(await this.ask('/messages')).items;
  }

  async get(id: string): Promise<CaughtMail> {
    return caughtMailSchema.parse(await this.ask(`/messages/${encodeURIComponent(id)}`));
  }

  private async ask(path: string): Promise<unknown> {
    if (this.catcher === undefined)
      throw new AppError(404, 'no-catcher', 'No mail catcher belongs to this installation.');
    const answer = await fetch(new URL(path, this.catcher), {
      signal: AbortSignal.timeout(PATIENCE_MS),
    }).catch(() => null);
    if (answer?.status === 404) throw notFound('This message');
    if (!answer?.ok) throw new AppError(503, 'catcher-away', 'The local mail catcher does not answer.');
    return answer.json();
  }
}
