import { pipeline } from 'node:stream/promises';
import { Controller, Get, Inject, Param, Req, Res } from '@nestjs/common';
import { ApiOkResponse, ApiTags } from '@nestjs/swagger';
import type { Request, Response } from 'express';
import { z } from 'zod';
import type { Actor } from '../../access/actor.js';
import { CurrentActor, Permit } from '../../access/decorators.js';
import { type SheetFile, SheetFilesService } from './sheet-files.service.js';

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
    await send(await this.files.image(actor, sheetId), request, response);
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
    await send(await this.files.thumbnail(actor, sheetId), request, response);
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
    await send(await this.files.pagePreview(actor, sheetId, pageNumber), request, response);
  }
}

/**
 * Streams a file. `no-cache` has the browser ask before each use, and only its own cache may keep a copy:
 * after sign-out or on a shared proxy the picture is not to be had, yet an unchanged one is sent only once.
 */
async function send(file: SheetFile, request: Request, response: Response): Promise<void> {
  response.set({
    'Cache-Control': 'private, no-cache',
    Vary: 'Cookie',
    ETag: file.etag,
    'X-Content-Type-Options': 'nosniff',
    'Content-Security-Policy': "default-src 'none'; sandbox",
    'Content-Disposition': 'inline',
  });
  if (request.fresh) {
    response.status(304).end();
    return;
  }
  const { stream, length, type } = await file.open();
  response.set({ 'Content-Type': type, 'Content-Length': String(length) });
  try {
    await pipeline(stream, response);
  } catch (error) {
    // A reader who went away is no failure of ours.
    if (!request.destroyed && !response.destroyed) throw error;
  }
}
