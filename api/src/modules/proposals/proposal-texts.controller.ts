import { Body, Controller, Get, Inject, Put } from '@nestjs/common';
import { ApiOkResponse, ApiTags } from '@nestjs/swagger';
import type { Actor } from '../../access/actor.js';
import { CurrentActor, Permit } from '../../access/decorators.js';
import { ProposalTextsService } from './proposal-texts.service.js';
import {
  type ProposalTextsAnswer,
  type ProposalTextsEdit,
  proposalTextsAnswerSchema,
  proposalTextsEditSchema,
} from './proposals.dto.js';

@ApiTags('proposals')
@Controller('api/proposal-texts')
export class ProposalTextsController {
  constructor(@Inject(ProposalTextsService) private readonly texts: ProposalTextsService) {}

  @Get()
  @Permit('proposals.read')
  @ApiOkResponse({ standardSchema: proposalTextsAnswerSchema })
  get(@CurrentActor() actor: Actor): Promise<ProposalTextsAnswer> {
    return this.texts.get(actor);
  }

  @Put()
  @Permit('proposals.edit')
  @ApiOkResponse({ standardSchema: proposalTextsAnswerSchema })
  replace(
    @CurrentActor() actor: Actor,
    @Body({ schema: proposalTextsEditSchema }) input: ProposalTextsEdit,
  ): Promise<ProposalTextsAnswer> {
    return this.texts.replace(actor, input);
  }
}
