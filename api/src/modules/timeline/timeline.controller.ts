import { Controller, Get, Inject, Param, Query } from '@nestjs/common';
import { ApiOkResponse, ApiTags } from '@nestjs/swagger';
import { z } from 'zod';
import type { Actor } from '../../access/actor.js';
import { CurrentActor, Permit } from '../../access/decorators.js';
import {
  type Board,
  boardSchema,
  type Numbers,
  type NumbersQuery,
  numbersQuerySchema,
  numbersSchema,
  type Timeline,
  timelineSchema,
} from './timeline.dto.js';
import { TimelineService } from './timeline.service.js';

const id = { schema: z.uuid() };

@ApiTags('timeline')
@Controller('api')
export class TimelineController {
  constructor(@Inject(TimelineService) private readonly timeline: TimelineService) {}

  @Get('jobs/:jobId/timeline')
  @Permit('timeline.read')
  @ApiOkResponse({ standardSchema: timelineSchema })
  ofJob(@CurrentActor() actor: Actor, @Param('jobId', id) jobId: string): Promise<Timeline> {
    return this.timeline.ofJob(actor, jobId);
  }

  @Get('board')
  @Permit('board.read')
  @ApiOkResponse({ standardSchema: boardSchema })
  board(@CurrentActor() actor: Actor): Promise<Board> {
    return this.timeline.board(actor);
  }

  @Get('numbers')
  @Permit('numbers.read')
  @ApiOkResponse({ standardSchema: numbersSchema })
  numbers(
    @CurrentActor() actor: Actor,
    @Query({ schema: numbersQuerySchema }) query: NumbersQuery,
  ): Promise<Numbers> {
    return this.timeline.numbers(actor, query);
  }
}
