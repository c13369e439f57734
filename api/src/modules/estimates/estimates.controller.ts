import { estimateAnswerSchema } from '@lampwright/geometry/estimate';
import { Body, Controller, HttpCode, Inject, Post, Req, Res } from '@nestjs/common';
import { ApiBody, ApiOkResponse, ApiTags } from '@nestjs/swagger';
import type { Request, Response } from 'express';
import type { Actor } from '../../access/actor.js';
import { CurrentActor, Permit } from '../../access/decorators.js';
import { jsonParseMilliseconds } from '../../http/bodies.js';
import { estimateRequestForOpenApi } from './estimates.dto.js';
import { EstimatesService } from './estimates.service.js';

@ApiTags('estimates')
@Controller('api/estimates')
export class EstimatesController {
  constructor(@Inject(EstimatesService) private readonly estimates: EstimatesService) {}

  /** Writes the answer itself, so that the time of writing it can be told in a header before it. */
  @Post()
  @HttpCode(200)
  @Permit('estimates.run')
  @ApiBody({ schema: estimateRequestForOpenApi() })
  @ApiOkResponse({ standardSchema: estimateAnswerSchema })
  estimate(
    @CurrentActor() actor: Actor,
    @Body() body: unknown,
    @Req() request: Request,
    @Res() response: Response,
  ): void {
    const { json, milliseconds } = this.estimates.estimate(actor, body);
    const parts = { parse: jsonParseMilliseconds(request), ...milliseconds };
    const timing = Object.entries(parts).map(([name, took]) => `${name};dur=${took.toFixed(3)}`);
    response
      .status(200)
      .set({ 'Content-Type': 'application/json; charset=utf-8', 'Server-Timing': timing.join(', ') })
      .send(json);
  }
}
