import { Controller, Get, Header, Inject, Param } from '@nestjs/common';
import { ApiExcludeController } from '@nestjs/swagger';
import { z } from 'zod';
import { Public } from '../../access/decorators.js';
import type { CaughtMail } from '../../ports/mail/caught-mail.js';
import { DevMailService } from './dev-mail.service.js';
import { listPage, mailPage } from './pages.js';

const HTML = 'text/html; charset=utf-8';
/** These pages run no script and load nothing; their one frame is written into them. */
const POLICY =
  "default-src 'none'; style-src 'unsafe-inline'; img-src data:; frame-ancestors 'none'; base-uri 'self'";

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
}
