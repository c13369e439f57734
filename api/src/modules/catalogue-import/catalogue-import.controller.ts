import {
  Body,
  Controller,
  Get,
  HttpCode,
  Inject,
  Param,
  Post,
  Query,
  Req,
  Res,
  UseInterceptors,
} from '@nestjs/common';
import { ApiConsumes, ApiCreatedResponse, ApiOkResponse, ApiTags } from '@nestjs/swagger';
import type { Request, Response } from 'express';
import { z } from 'zod';
import type { Actor } from '../../access/actor.js';
import { CurrentActor, Permit } from '../../access/decorators.js';
import { Once } from '../../http/once.js';
import { sendFile } from '../../http/send-file.js';
import { UploadInterceptor } from '../sheets/upload.interceptor.js';
import { CatalogueExportService } from './catalogue-export.service.js';
import {
  type DoneImport,
  type DoneImports,
  doneImportSchema,
  doneImportsSchema,
  type ExportQuery,
  exportQuerySchema,
  type Import,
  importSchema,
  type Preview,
  previewSchema,
  type Table,
  type TableUpload,
  tableSchema,
  tableUploadSchema,
  type Undone,
  undoneSchema,
} from './catalogue-import.dto.js';
import { CatalogueImportService } from './catalogue-import.service.js';

const id = { schema: z.uuid() };

@ApiTags('catalogue')
@Controller('api/catalogue')
export class CatalogueImportController {
  constructor(
    @Inject(CatalogueImportService) private readonly imports: CatalogueImportService,
    @Inject(CatalogueExportService) private readonly exports: CatalogueExportService,
  ) {}

  @Post('tables')
  @HttpCode(200)
  @Permit('catalogue.edit')
  @UseInterceptors(UploadInterceptor)
  @ApiConsumes('multipart/form-data')
  @ApiOkResponse({ standardSchema: tableSchema })
  read(@CurrentActor() actor: Actor, @Body({ schema: tableUploadSchema }) form: TableUpload): Promise<Table> {
    return this.imports.read(actor, form);
  }

  @Post('imports/preview')
  @HttpCode(200)
  @Permit('catalogue.edit')
  @ApiOkResponse({ standardSchema: previewSchema })
  preview(@CurrentActor() actor: Actor, @Body({ schema: importSchema }) input: Import): Promise<Preview> {
    return this.imports.preview(actor, input);
  }

  @Post('imports')
  @Permit('catalogue.edit')
  @Once()
  @ApiCreatedResponse({ standardSchema: doneImportSchema })
  take(@CurrentActor() actor: Actor, @Body({ schema: importSchema }) input: Import): Promise<DoneImport> {
    return this.imports.take(actor, input);
  }

  @Get('imports')
  @Permit('catalogue.edit')
  @ApiOkResponse({ standardSchema: doneImportsSchema })
  list(@CurrentActor() actor: Actor): Promise<DoneImports> {
    return this.imports.list(actor);
  }

  @Post('imports/:importId/undo')
  @HttpCode(200)
  @Permit('catalogue.edit')
  @ApiOkResponse({ standardSchema: undoneSchema })
  undo(@CurrentActor() actor: Actor, @Param('importId', id) importId: string): Promise<Undone> {
    return this.imports.undo(actor, importId);
  }

  @Get('export')
  @Permit('catalogue.edit')
  @ApiOkResponse({ description: 'The table.', schema: { type: 'string', format: 'binary' } })
  async export(
    @CurrentActor() actor: Actor,
    @Query({ schema: exportQuerySchema }) query: ExportQuery,
    @Req() request: Request,
    @Res() response: Response,
  ): Promise<void> {
    await sendFile(await this.exports.write(actor, query), request, response);
  }
}
