import {
  Body,
  Controller,
  Delete,
  Get,
  HttpCode,
  Inject,
  Param,
  Patch,
  Post,
  UseInterceptors,
} from '@nestjs/common';
import {
  ApiAcceptedResponse,
  ApiConsumes,
  ApiNoContentResponse,
  ApiOkResponse,
  ApiTags,
} from '@nestjs/swagger';
import { z } from 'zod';
import type { Actor } from '../../access/actor.js';
import { CurrentActor, Permit } from '../../access/decorators.js';
import {
  type Sheet,
  type SheetEdit,
  type SheetList,
  type SheetPage,
  type SheetUpload,
  sheetEditSchema,
  sheetListSchema,
  sheetPageSchema,
  sheetSchema,
  sheetUploadSchema,
} from './sheets.dto.js';
import { SheetsService } from './sheets.service.js';
import { UploadInterceptor } from './upload.interceptor.js';

const id = { schema: z.uuid() };

@ApiTags('sheets')
@Controller('api')
export class SheetsController {
  constructor(@Inject(SheetsService) private readonly sheets: SheetsService) {}

  @Get('jobs/:id/sheets')
  @Permit('sheets.read')
  @ApiOkResponse({ standardSchema: sheetListSchema })
  list(@CurrentActor() actor: Actor, @Param('id', id) jobId: string): Promise<SheetList> {
    return this.sheets.listOfJob(actor, jobId);
  }

  @Post('jobs/:id/sheets')
  @HttpCode(202)
  @Permit('sheets.edit')
  @UseInterceptors(UploadInterceptor)
  @ApiConsumes('multipart/form-data')
  @ApiAcceptedResponse({ standardSchema: sheetSchema })
  upload(
    @CurrentActor() actor: Actor,
    @Param('id', id) jobId: string,
    @Body({ schema: sheetUploadSchema }) form: SheetUpload,
  ): Promise<Sheet> {
    return this.sheets.upload(actor, jobId, form);
  }

  @Get('sheets/:id')
  @Permit('sheets.read')
  @ApiOkResponse({ standardSchema: sheetSchema })
  get(@CurrentActor() actor: Actor, @Param('id', id) sheetId: string): Promise<Sheet> {
    return this.sheets.get(actor, sheetId);
  }

  @Patch('sheets/:id')
  @Permit('sheets.edit')
  @ApiOkResponse({ standardSchema: sheetSchema })
  rename(
    @CurrentActor() actor: Actor,
    @Param('id', id) sheetId: string,
    @Body({ schema: sheetEditSchema }) edit: SheetEdit,
  ): Promise<Sheet> {
    return this.sheets.rename(actor, sheetId, edit.name);
  }

  @Delete('sheets/:id')
  @HttpCode(204)
  @Permit('sheets.edit')
  @ApiNoContentResponse()
  remove(@CurrentActor() actor: Actor, @Param('id', id) sheetId: string): Promise<void> {
    return this.sheets.remove(actor, sheetId);
  }

  @Post('sheets/:id/page')
  @HttpCode(202)
  @Permit('sheets.edit')
  @ApiAcceptedResponse({ standardSchema: sheetSchema })
  choosePage(
    @CurrentActor() actor: Actor,
    @Param('id', id) sheetId: string,
    @Body({ schema: sheetPageSchema }) { page }: SheetPage,
  ): Promise<Sheet> {
    return this.sheets.choosePage(actor, sheetId, page);
  }

  @Post('sheets/:id/retry')
  @HttpCode(202)
  @Permit('sheets.edit')
  @ApiAcceptedResponse({ standardSchema: sheetSchema })
  retry(@CurrentActor() actor: Actor, @Param('id', id) sheetId: string): Promise<Sheet> {
    return this.sheets.retry(actor, sheetId);
  }
}
