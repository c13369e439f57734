import { Inject, Injectable } from '@nestjs/common';
import { ENV } from '../../config/config.module.js';
import { type Env, isLocal } from '../../config/env.js';
import { AppError, notFound } from '../../http/app-error.js';
import {
  type CaughtAttachment,
  type CaughtMail,
  caughtMailListSchema,
  caughtMailSchema,
} from '../../ports/mail/caught-mail.js';

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

  /** The bytes of what came with a message; attachments are counted from 0. */
  async attachment(id: string, index: number): Promise<CaughtAttachment & { body: Buffer }> {
    const attachment = (await this.get(id)).attachments[index];
    if (!attachment) throw notFound('This attachment');
    const answer = await this.fetch(`/messages/${encodeURIComponent(id)}/attachments/${index}`);
    return { ...attachment, body: Buffer.from(await answer.arrayBuffer()) };
  }

  private async ask(path: string): Promise<unknown> {
    return (await this.fetch(path)).json();
  }

  private async fetch(path: string): Promise<Response> {
    if (this.catcher === undefined)
      throw new AppError(404, 'no-catcher', 'No mail catcher belongs to this installation.');
    const answer = await fetch(new URL(path, this.catcher), {
      signal: AbortSignal.timeout(PATIENCE_MS),
    }).catch(() => null);
    if (answer?.status === 404) throw notFound('This message');
    if (!answer?.ok) throw new AppError(503, 'catcher-away', 'The local mail catcher does not answer.');
    return answer;
  }
}
