import { Controller, Get, Header, Inject, Param, Res } from '@nestjs/common';
import { ApiExcludeController } from '@nestjs/swagger';
import type { Response } from 'express';
import { z } from 'zod';
import { Public } from '../../access/decorators.js';
import type { CaughtMail } from '../../ports/mail/caught-mail.js';
import { DevMailService } from './dev-mail.service.js';
import { listPage, mailPage } from './pages.js';

const HTML = 'text/html; charset=utf-8';
/** These pages run no script and load nothing; their one frame is written into them. */
const POLICY =
  "default-src 'none'; style-src 'unsafe-inline'; img-src data:; frame-ancestors 'none'; base-uri 'self'";

/** A browser shows these by itself; anything else is only saved, so that no markup from a message runs here. */
const SHOWN_TYPES = new Set(['application/pdf', 'image/jpeg', 'image/png', 'image/webp']);
/** Without `sandbox`, which browsers' PDF viewers refuse. */
const FILE_POLICY =
  "default-src 'none'; object-src 'self'; style-src 'unsafe-inline'; frame-ancestors 'none'";

/** As an extended parameter holds it (RFC 8187). */
const encoded = (name: string) =>
  encodeURIComponent(name).replace(/['()*]/g, (sign) => `%${sign.charCodeAt(0).toString(16).toUpperCase()}`);

/** Mail caught in local mode, for people and for tests. */
@ApiExcludeController()
@Controller('dev/mail')
@Public()
export class DevMailController {
  constructor(@Inject(DevMailService) private readonly mail: DevMailService) {}

  @Get()
  @Header('Content-Type', HTML)
  @Header('Content-Security-Policy', POLICY)
  @Header('Cache-Control', 'no-store')
  async list(): Promise<string> {
    return listPage(await this.mail.list());
  }

  @Get('messages.json')
  @Header('Cache-Control', 'no-store')
  async json(): Promise<{ items: CaughtMail[] }> {
    return { items: await this.mail.list() };
  }

  @Get('messages/:id')
  @Header('Content-Type', HTML)
  @Header('Content-Security-Policy', POLICY)
  @Header('Cache-Control', 'no-store')
  async show(@Param('id', { schema: z.uuid() }) id: string): Promise<string> {
    return mailPage(await this.mail.get(id));
  }

  @Get('messages/:id/attachments/:index')
  async attachment(
    @Param('id', { schema: z.uuid() }) id: string,
    @Param('index', { schema: z.coerce.number().int().min(0).max(9999) }) index: number,
    @Res() response: Response,
  ): Promise<void> {
    const { fileName, type, body } = await this.mail.attachment(id, index);
    const shown = SHOWN_TYPES.has(type);
    response
      .set({
        'Content-Type': shown ? type : 'application/octet-stream',
        'Content-Disposition': `${shown ? 'inline' : 'attachment'}; filename*=UTF-8''${encoded(fileName)}`,
        'Content-Security-Policy': FILE_POLICY,
        'Cache-Control': 'no-store',
        'X-Content-Type-Options': 'nosniff',
      })
      .send(body);
  }
}
