import { Body, Controller, Get, HttpCode, Inject, Param, Post, Query, Req, Res } from '@nestjs/common';
import {
  ApiConflictResponse,
  ApiCreatedResponse,
  ApiOkResponse,
  ApiProduces,
  ApiTags,
} from '@nestjs/swagger';
import type { Request, Response } from 'express';
import { z } from 'zod';
import type { Actor } from '../../access/actor.js';
import { CurrentActor, Permit } from '../../access/decorators.js';
import { PlanEvents } from './plan-events.js';
import {
  type Changes,
  type ChangesQuery,
  changesQuerySchema,
  changesSchema,
  type History,
  type HistoryQuery,
  historyQuerySchema,
  historySchema,
  type Plan,
  planSchema,
  type Restore,
  restoreSchema,
  type Save,
  type Saved,
  type SummaryAnswer,
  saveConflictSchema,
  savedSchema,
  saveSchema,
  summaryAnswerSchema,
} from './plans.dto.js';
import { PlansService } from './plans.service.js';

const id = { schema: z.uuid() };

@ApiTags('plan')
@Controller('api/jobs/:jobId/plan')
export class PlansController {
  constructor(
    @Inject(PlansService) private readonly plans: PlansService,
    @Inject(PlanEvents) private readonly events: PlanEvents,
  ) {}

  @Get()
  @Permit('plan.read')
  @ApiOkResponse({ standardSchema: planSchema })
  get(@CurrentActor() actor: Actor, @Param('jobId', id) jobId: string): Promise<Plan> {
    return this.plans.get(actor, jobId);
  }

  @Get('changes')
  @Permit('plan.read')
  @ApiOkResponse({ standardSchema: changesSchema })
  changes(
    @CurrentActor() actor: Actor,
    @Param('jobId', id) jobId: string,
    @Query({ schema: changesQuerySchema }) query: ChangesQuery,
  ): Promise<Changes> {
    return this.plans.changesSince(actor, jobId, query);
  }

  @Post('changes')
  @HttpCode(200)
  @Permit('plan.edit')
  @ApiOkResponse({ standardSchema: savedSchema })
  @ApiConflictResponse({ standardSchema: saveConflictSchema })
  save(
    @CurrentActor() actor: Actor,
    @Param('jobId', id) jobId: string,
    @Body({ schema: saveSchema }) request: Save,
  ): Promise<Saved> {
    return this.plans.save(actor, jobId, request);
  }

  @Get('history')
  @Permit('plan.read')
  @ApiOkResponse({ standardSchema: historySchema })
  history(
    @CurrentActor() actor: Actor,
    @Param('jobId', id) jobId: string,
    @Query({ schema: historyQuerySchema }) query: HistoryQuery,
  ): Promise<History> {
    return this.plans.history(actor, jobId, query);
  }

  @Post('restore')
  @Permit('plan.edit')
  @ApiCreatedResponse({ standardSchema: savedSchema })
  restore(
    @CurrentActor() actor: Actor,
    @Param('jobId', id) jobId: string,
    @Body({ schema: restoreSchema }) restore: Restore,
  ): Promise<Saved> {
    return this.plans.restore(actor, jobId, restore);
  }

  @Get('summary')
  @Permit('plan.read')
  @ApiOkResponse({ standardSchema: summaryAnswerSchema })
  summary(@CurrentActor() actor: Actor, @Param('jobId', id) jobId: string): Promise<SummaryAnswer> {
    return this.plans.summary(actor, jobId);
  }

  /** Server-sent events, each `{"version": n}`: the present one at once, then each new one. */
  @Get('events')
  @Permit('plan.read')
  @ApiProduces('text/event-stream')
  @ApiOkResponse({ description: 'A stream of {"version": n}.' })
  async follow(
    @CurrentActor() actor: Actor,
    @Param('jobId', id) jobId: string,
    @Req() request: Request,
    @Res() response: Response,
  ): Promise<void> {
    const present = () => this.plans.version(actor, jobId);
    await this.events.stream({ companyId: actor.companyId, jobId }, present, request, response);
  }
}
