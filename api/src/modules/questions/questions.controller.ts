import { Body, Controller, Get, HttpCode, Inject, Param, Post } from '@nestjs/common';
import { ApiCreatedResponse, ApiOkResponse, ApiTags } from '@nestjs/swagger';
import { z } from 'zod';
import type { Actor } from '../../access/actor.js';
import { CurrentActor, Permit } from '../../access/decorators.js';
import { Once } from '../../http/once.js';
import {
  type NewMessage,
  newMessageSchema,
  type Question,
  type Questions,
  questionSchema,
  questionsSchema,
} from '../proposals/proposals.dto.js';
import { QuestionsService } from './questions.service.js';

const id = { schema: z.uuid() };

@ApiTags('proposals')
@Controller('api/jobs/:jobId/questions')
export class QuestionsController {
  constructor(@Inject(QuestionsService) private readonly questions: QuestionsService) {}

  @Get()
  @Permit('proposals.read')
  @ApiOkResponse({ standardSchema: questionsSchema })
  list(@CurrentActor() actor: Actor, @Param('jobId', id) jobId: string): Promise<Questions> {
    return this.questions.list(actor, jobId);
  }

  @Post(':questionId/messages')
  @Permit('questions.answer')
  @Once()
  @ApiCreatedResponse({ standardSchema: questionSchema })
  answer(
    @CurrentActor() actor: Actor,
    @Param('jobId', id) jobId: string,
    @Param('questionId', id) questionId: string,
    @Body({ schema: newMessageSchema }) input: NewMessage,
  ): Promise<Question> {
    return this.questions.answer(actor, jobId, questionId, input);
  }

  @Post(':questionId/resolve')
  @HttpCode(200)
  @Permit('questions.answer')
  @ApiOkResponse({ standardSchema: questionSchema })
  resolve(
    @CurrentActor() actor: Actor,
    @Param('jobId', id) jobId: string,
    @Param('questionId', id) questionId: string,
  ): Promise<Question> {
    return this.questions.resolve(actor, jobId, questionId);
  }

  @Post(':questionId/reopen')
  @HttpCode(200)
  @Permit('questions.answer')
  @ApiOkResponse({ standardSchema: questionSchema })
  reopen(
    @CurrentActor() actor: Actor,
    @Param('jobId', id) jobId: string,
    @Param('questionId', id) questionId: string,
  ): Promise<Question> {
    return this.questions.reopen(actor, jobId, questionId);
  }
}
