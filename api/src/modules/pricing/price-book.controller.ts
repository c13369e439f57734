import { Body, Controller, Get, Inject, Param, Put } from '@nestjs/common';
import { ApiOkResponse, ApiTags } from '@nestjs/swagger';
import { z } from 'zod';
import type { Actor } from '../../access/actor.js';
import { CurrentActor, Permit } from '../../access/decorators.js';
import { PriceBookService } from './price-book.service.js';
import {
  type CataloguePrices,
  cataloguePricesSchema,
  type ItemPriceEdit,
  itemPriceEditSchema,
  type PriceBookAnswer,
  type PriceBookEdit,
  type PriceHistory,
  priceBookAnswerSchema,
  priceBookEditSchema,
  priceHistorySchema,
} from './pricing.dto.js';

const id = { schema: z.uuid() };

@ApiTags('prices')
@Controller('api')
export class PriceBookController {
  constructor(@Inject(PriceBookService) private readonly prices: PriceBookService) {}

  @Get('price-book')
  @Permit('prices.read')
  @ApiOkResponse({ standardSchema: priceBookAnswerSchema })
  get(@CurrentActor() actor: Actor): Promise<PriceBookAnswer> {
    return this.prices.get(actor);
  }

  @Put('price-book')
  @Permit('price-book.edit')
  @ApiOkResponse({ standardSchema: priceBookAnswerSchema })
  replace(
    @CurrentActor() actor: Actor,
    @Body({ schema: priceBookEditSchema }) input: PriceBookEdit,
  ): Promise<PriceBookAnswer> {
    return this.prices.replace(actor, input);
  }

  @Get('catalogue-prices')
  @Permit('prices.read')
  @ApiOkResponse({ standardSchema: cataloguePricesSchema })
  cataloguePrices(@CurrentActor() actor: Actor): Promise<CataloguePrices> {
    return this.prices.cataloguePrices(actor);
  }

  @Put('catalogue/:itemId/price')
  @Permit('prices.edit')
  @ApiOkResponse({ standardSchema: cataloguePricesSchema })
  setPrice(
    @CurrentActor() actor: Actor,
    @Param('itemId', id) itemId: string,
    @Body({ schema: itemPriceEditSchema }) input: ItemPriceEdit,
  ): Promise<CataloguePrices> {
    return this.prices.setPrice(actor, itemId, input);
  }

  @Get('catalogue/:itemId/prices')
  @Permit('prices.read')
  @ApiOkResponse({ standardSchema: priceHistorySchema })
  history(@CurrentActor() actor: Actor, @Param('itemId', id) itemId: string): Promise<PriceHistory> {
    return this.prices.history(actor, itemId);
  }
}
