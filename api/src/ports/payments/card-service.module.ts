import { Global, Module } from '@nestjs/common';
import { ENV } from '../../config/config.module.js';
import type { Env } from '../../config/env.js';
import { CardService } from './card-service.js';
import { NoCardService } from './no-card-service.js';
import { StripeCardService } from './stripe-card-service.js';

function cardServiceOf(env: Env): CardService {
  const { STRIPE_SECRET_KEY: secretKey, STRIPE_WEBHOOK_SECRET: webhookSecret } = env;
  if (secretKey === undefined || webhookSecret === undefined) return new NoCardService();
  return new StripeCardService({ secretKey, webhookSecret, apiBase: env.STRIPE_API_BASE });
}

@Global()
@Module({
  providers: [{ provide: CardService, inject: [ENV], useFactory: cardServiceOf }],
  exports: [CardService],
})
export class CardServiceModule {}
