import { Body, Controller, Get, HttpCode, Inject, Param, Post, Put, Req, Res } from '@nestjs/common';
import { ApiCreatedResponse, ApiOkResponse, ApiTags } from '@nestjs/swagger';
import type { Request, Response } from 'express';
import { z } from 'zod';
import type { Actor } from '../../access/actor.js';
import { CurrentActor, Permit } from '../../access/decorators.js';
import { Once } from '../../http/once.js';
import { sendFile } from '../../http/send-file.js';
import {
  type JobWords,
  jobWordsSchema,
  linkSchema,
  type Proposal,
  type ProposalLink,
  proposalSchema,
  type Revision,
  type RevisionDetail,
  revisionDetailSchema,
  revisionSchema,
  type Send,
  sendSchema,
} from './proposals.dto.js';
import { ProposalsService } from './proposals.service.js';

const id = { schema: z.uuid() };
const file = { description: 'The file.', schema: { type: 'string', format: 'binary' } };

@ApiTags('proposals')
@Controller('api/jobs/:jobId/proposal')
export class ProposalsController {
  constructor(@Inject(ProposalsService) private readonly proposals: ProposalsService) {}

  @Get()
  @Permit('proposals.read')
  @ApiOkResponse({ standardSchema: proposalSchema })
  get(@CurrentActor() actor: Actor, @Param('jobId', id) jobId: string): Promise<Proposal> {
    return this.proposals.get(actor, jobId);
  }

  @Put('words')
  @Permit('proposals.edit')
  @ApiOkResponse({ standardSchema: proposalSchema })
  setWords(
    @CurrentActor() actor: Actor,
    @Param('jobId', id) jobId: string,
    @Body({ schema: jobWordsSchema }) input: JobWords,
  ): Promise<Proposal> {
    return this.proposals.setWords(actor, jobId, input);
  }

  @Post('revisions')
  @Permit('proposals.edit')
  @Once()
  @ApiCreatedResponse({ standardSchema: revisionSchema })
  freeze(@CurrentActor() actor: Actor, @Param('jobId', id) jobId: string): Promise<Revision> {
    return this.proposals.freeze(actor, jobId);
  }

  @Get('revisions/:revisionId')
  @Permit('proposals.read')
  @ApiOkResponse({ standardSchema: revisionDetailSchema })
  detail(
    @CurrentActor() actor: Actor,
    @Param('jobId', id) jobId: string,
    @Param('revisionId', id) revisionId: string,
  ): Promise<RevisionDetail> {
    return this.proposals.detail(actor, jobId, revisionId);
  }

  @Get('revisions/:revisionId/pdf')
  @Permit('proposals.read')
  @ApiOkResponse(file)
  async pdf(
    @CurrentActor() actor: Actor,
    @Param('jobId', id) jobId: string,
    @Param('revisionId', id) revisionId: string,
    @Req() request: Request,
    @Res() response: Response,
  ): Promise<void> {
    await sendFile(await this.proposals.pdf(actor, jobId, revisionId), request, response);
  }

  @Get('revisions/:revisionId/signed-pdf')
  @Permit('proposals.read')
  @ApiOkResponse(file)
  async signedPdf(
    @CurrentActor() actor: Actor,
    @Param('jobId', id) jobId: string,
    @Param('revisionId', id) revisionId: string,
    @Req() request: Request,
    @Res() response: Response,
  ): Promise<void> {
    await sendFile(await this.proposals.signedPdf(actor, jobId, revisionId), request, response);
  }

  @Post('revisions/:revisionId/send')
  @HttpCode(200)
  @Permit('proposals.edit')
  @Once()
  @ApiOkResponse({ standardSchema: revisionSchema })
  send(
    @CurrentActor() actor: Actor,
    @Param('jobId', id) jobId: string,
    @Param('revisionId', id) revisionId: string,
    @Body({ schema: sendSchema }) input: Send,
  ): Promise<Revision> {
    return this.proposals.send(actor, jobId, revisionId, input);
  }

  @Post('revisions/:revisionId/withdraw')
  @HttpCode(200)
  @Permit('proposals.edit')
  @ApiOkResponse({ standardSchema: revisionSchema })
  withdraw(
    @CurrentActor() actor: Actor,
    @Param('jobId', id) jobId: string,
    @Param('revisionId', id) revisionId: string,
  ): Promise<Revision> {
    return this.proposals.withdraw(actor, jobId, revisionId);
  }

  @Post('revisions/:revisionId/release')
  @HttpCode(200)
  @Permit('proposals.edit')
  @ApiOkResponse({ standardSchema: revisionSchema })
  release(
    @CurrentActor() actor: Actor,
    @Param('jobId', id) jobId: string,
    @Param('revisionId', id) revisionId: string,
  ): Promise<Revision> {
    return this.proposals.release(actor, jobId, revisionId);
  }

  @Post('links/:linkId/resend')
  @HttpCode(200)
  @Permit('proposals.edit')
  @Once()
  @ApiOkResponse({ standardSchema: linkSchema })
  resend(
    @CurrentActor() actor: Actor,
    @Param('jobId', id) jobId: string,
    @Param('linkId', id) linkId: string,
  ): Promise<ProposalLink> {
    return this.proposals.resend(actor, jobId, linkId);
  }

  @Post('links/:linkId/revoke')
  @HttpCode(200)
  @Permit('proposals.edit')
  @ApiOkResponse({ standardSchema: linkSchema })
  revoke(
    @CurrentActor() actor: Actor,
    @Param('jobId', id) jobId: string,
    @Param('linkId', id) linkId: string,
  ): Promise<ProposalLink> {
    return this.proposals.revoke(actor, jobId, linkId);
  }
}
