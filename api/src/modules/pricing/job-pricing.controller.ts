import { Body, Controller, Delete, Get, HttpCode, Inject, Param, Post, Put } from '@nestjs/common';
import { ApiCreatedResponse, ApiNoContentResponse, ApiOkResponse, ApiTags } from '@nestjs/swagger';
import { z } from 'zod';
import type { Actor } from '../../access/actor.js';
import { CurrentActor, Permit } from '../../access/decorators.js';
import { JobPricingService } from './job-pricing.service.js';
import {
  type Acceptance,
  type AcceptFault,
  acceptanceSchema,
  acceptFaultSchema,
  type JobPricingAnswer,
  type JobPricingEdit,
  jobPricingAnswerSchema,
  jobPricingEditSchema,
  type Materials,
  materialsSchema,
  type QuoteAnswer,
  quoteAnswerSchema,
} from './pricing.dto.js';

const id = { schema: z.uuid() };

@ApiTags('prices')
@Controller('api/jobs/:jobId')
export class JobPricingController {
  constructor(@Inject(JobPricingService) private readonly pricing: JobPricingService) {}

  @Get('pricing')
  @Permit('prices.read')
  @ApiOkResponse({ standardSchema: jobPricingAnswerSchema })
  get(@CurrentActor() actor: Actor, @Param('jobId', id) jobId: string): Promise<JobPricingAnswer> {
    return this.pricing.get(actor, jobId);
  }

  @Put('pricing')
  @Permit('prices.edit')
  @ApiOkResponse({ standardSchema: jobPricingAnswerSchema })
  replace(
    @CurrentActor() actor: Actor,
    @Param('jobId', id) jobId: string,
    @Body({ schema: jobPricingEditSchema }) input: JobPricingEdit,
  ): Promise<JobPricingAnswer> {
    return this.pricing.replace(actor, jobId, input);
  }

  @Get('quote')
  @Permit('prices.read')
  @ApiOkResponse({ standardSchema: quoteAnswerSchema })
  quote(@CurrentActor() actor: Actor, @Param('jobId', id) jobId: string): Promise<QuoteAnswer> {
    return this.pricing.quote(actor, jobId);
  }

  @Get('materials')
  @Permit('jobs.read')
  @ApiOkResponse({ standardSchema: materialsSchema })
  materials(@CurrentActor() actor: Actor, @Param('jobId', id) jobId: string): Promise<Materials> {
    return this.pricing.materials(actor, jobId);
  }

  @Post('fault-acceptances')
  @Permit('prices.edit')
  @ApiCreatedResponse({ standardSchema: acceptanceSchema })
  accept(
    @CurrentActor() actor: Actor,
    @Param('jobId', id) jobId: string,
    @Body({ schema: acceptFaultSchema }) input: AcceptFault,
  ): Promise<Acceptance> {
    return this.pricing.accept(actor, jobId, input);
  }

  @Delete('fault-acceptances/:acceptanceId')
  @HttpCode(204)
  @Permit('prices.edit')
  @ApiNoContentResponse()
  withdrawAcceptance(
    @CurrentActor() actor: Actor,
    @Param('jobId', id) jobId: string,
    @Param('acceptanceId', id) acceptanceId: string,
  ): Promise<void> {
    return this.pricing.withdrawAcceptance(actor, jobId, acceptanceId);
  }
}
