import { Controller, Get, Inject, Param, Req, Res } from '@nestjs/common';
import { ApiOkResponse, ApiTags } from '@nestjs/swagger';
import type { Request, Response } from 'express';
import { z } from 'zod';
import type { Actor } from '../../access/actor.js';
import { CurrentActor, Permit } from '../../access/decorators.js';
import { sendFile } from '../../http/send-file.js';
import { SheetFilesService } from './sheet-files.service.js';

const id = { schema: z.uuid() };
const page = { schema: z.coerce.number().int().min(1).max(10_000) };
const picture = { description: 'A JPEG or PNG picture.', schema: { type: 'string', format: 'binary' } };

@ApiTags('sheets')
@Controller('api/sheets')
export class SheetFilesController {
  constructor(@Inject(SheetFilesService) private readonly files: SheetFilesService) {}

  @Get(':id/image')
  @Permit('sheets.read')
  @ApiOkResponse(picture)
  async image(
    @CurrentActor() actor: Actor,
    @Param('id', id) sheetId: string,
    @Req() request: Request,
    @Res() response: Response,
  ): Promise<void> {
    await sendFile(await this.files.image(actor, sheetId), request, response);
  }

  @Get(':id/thumbnail')
  @Permit('sheets.read')
  @ApiOkResponse(picture)
  async thumbnail(
    @CurrentActor() actor: Actor,
    @Param('id', id) sheetId: string,
    @Req() request: Request,
    @Res() response: Response,
  ): Promise<void> {
    await sendFile(await this.files.thumbnail(actor, sheetId), request, response);
  }

  @Get(':id/pages/:page')
  @Permit('sheets.read')
  @ApiOkResponse(picture)
  async pagePreview(
    @CurrentActor() actor: Actor,
    @Param('id', id) sheetId: string,
    @Param('page', page) pageNumber: number,
    @Req() request: Request,
    @Res() response: Response,
  ): Promise<void> {
    await sendFile(await this.files.pagePreview(actor, sheetId, pageNumber), request, response);
  }
}
