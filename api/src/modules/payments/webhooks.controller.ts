import { Controller, Headers, HttpCode, Inject, Post, Req } from '@nestjs/common';
import { ApiNoContentResponse, ApiTags } from '@nestjs/swagger';
import type { Request } from 'express';
import { Public } from '../../access/decorators.js';
import { CardWords } from './card-words.js';

@ApiTags('payments')
@Controller('api/webhooks')
export class WebhooksController {
  constructor(@Inject(CardWords) private readonly words: CardWords) {}

  /** For the card service alone: nobody is signed in, and only what it signed counts. */
  @Post('stripe')
  @HttpCode(204)
  @Public()
  @ApiNoContentResponse()
  stripe(@Req() request: Request, @Headers('stripe-signature') signature = ''): Promise<void> {
    return this.words.hear(request.body, signature);
  }
}
