import { Body, Controller, Get, HttpCode, Inject, Param, Post, Query, Req, Res } from '@nestjs/common';
import { ApiCreatedResponse, ApiNoContentResponse, ApiOkResponse, ApiTags } from '@nestjs/swagger';
import type { Request, Response } from 'express';
import { z } from 'zod';
import { CurrentGuest, Shared } from '../../access/decorators.js';
import type { Guest } from '../../access/guest.js';
import { Once } from '../../http/once.js';
import { sendFile } from '../../http/send-file.js';
import {
  type NewMessage,
  newMessageSchema,
  type Question,
  questionSchema,
} from '../proposals/proposals.dto.js';
import { guestCallerOf } from './guest-caller.js';
import {
  type Approve,
  type Ask,
  approveSchema,
  askSchema,
  type Checkout,
  checkoutSchema,
  type Decline,
  declineSchema,
  type PictureQuery,
  pictureQuerySchema,
  type SharedNight,
  type SharedPage,
  sharedNightSchema,
  sharedPageSchema,
} from './share.dto.js';
import { ShareService } from './share.service.js';

const id = { schema: z.uuid() };
const text = { schema: z.string().min(1).max(200) };
const file = { description: 'The file.', schema: { type: 'string', format: 'binary' } };

@ApiTags('share')
@Controller('api/share/:linkId')
export class ShareController {
  constructor(@Inject(ShareService) private readonly share: ShareService) {}

  @Get()
  @Shared()
  @ApiOkResponse({ standardSchema: sharedPageSchema })
  page(@CurrentGuest() guest: Guest, @Param('linkId', id) linkId: string): Promise<SharedPage> {
    return this.share.page(guest, linkId);
  }

  @Post('opened')
  @HttpCode(204)
  @Shared()
  @ApiNoContentResponse()
  opened(@CurrentGuest() guest: Guest, @Param('linkId', id) linkId: string): Promise<void> {
    return this.share.opened(guest, linkId);
  }

  @Get('pictures/:sheetId')
  @Shared()
  @ApiOkResponse(file)
  async picture(
    @CurrentGuest() guest: Guest,
    @Param('linkId', id) linkId: string,
    @Param('sheetId', text) sheetId: string,
    @Query({ schema: pictureQuerySchema }) { width }: PictureQuery,
    @Req() request: Request,
    @Res() response: Response,
  ): Promise<void> {
    await sendFile(await this.share.picture(guest, linkId, sheetId, width !== undefined), request, response);
  }

  @Get('night')
  @Shared()
  @ApiOkResponse({ standardSchema: sharedNightSchema })
  night(@CurrentGuest() guest: Guest, @Param('linkId', id) linkId: string): Promise<SharedNight> {
    return this.share.night(guest, linkId);
  }

  @Get('papers/:paperId')
  @Shared()
  @ApiOkResponse(file)
  async paper(
    @CurrentGuest() guest: Guest,
    @Param('linkId', id) linkId: string,
    @Param('paperId', text) paperId: string,
    @Req() request: Request,
    @Res() response: Response,
  ): Promise<void> {
    await sendFile(await this.share.paper(guest, linkId, paperId), request, response);
  }

  @Post('questions')
  @Shared()
  @Once()
  @ApiCreatedResponse({ standardSchema: questionSchema })
  ask(
    @CurrentGuest() guest: Guest,
    @Param('linkId', id) linkId: string,
    @Body({ schema: askSchema }) input: Ask,
  ): Promise<Question> {
    return this.share.ask(guest, linkId, input);
  }

  @Post('questions/:questionId/messages')
  @Shared()
  @Once()
  @ApiCreatedResponse({ standardSchema: questionSchema })
  reply(
    @CurrentGuest() guest: Guest,
    @Param('linkId', id) linkId: string,
    @Param('questionId', id) questionId: string,
    @Body({ schema: newMessageSchema }) input: NewMessage,
  ): Promise<Question> {
    return this.share.reply(guest, linkId, questionId, input);
  }

  @Post('approve')
  @HttpCode(200)
  @Shared()
  @Once()
  @ApiOkResponse({ standardSchema: sharedPageSchema })
  approve(
    @CurrentGuest() guest: Guest,
    @Param('linkId', id) linkId: string,
    @Body({ schema: approveSchema }) input: Approve,
    @Req() request: Request,
  ): Promise<SharedPage> {
    return this.share.approve(guest, linkId, input, guestCallerOf(request));
  }

  @Post('decline')
  @HttpCode(200)
  @Shared()
  @Once()
  @ApiOkResponse({ standardSchema: sharedPageSchema })
  decline(
    @CurrentGuest() guest: Guest,
    @Param('linkId', id) linkId: string,
    @Body({ schema: declineSchema }) input: Decline,
  ): Promise<SharedPage> {
    return this.share.decline(guest, linkId, input);
  }

  @Post('dues/:dueId/checkout')
  @HttpCode(200)
  @Shared()
  @Once('in-steps')
  @ApiOkResponse({ standardSchema: checkoutSchema })
  checkout(
    @CurrentGuest() guest: Guest,
    @Param('linkId', id) linkId: string,
    @Param('dueId', id) dueId: string,
  ): Promise<Checkout> {
    return this.share.checkout(guest, linkId, dueId);
  }
}
