import { Injectable } from '@nestjs/common';
import type { Actor } from '../../access/actor.js';
import { AppError } from '../../http/app-error.js';
import type {
  CataloguePrices,
  ItemPriceEdit,
  PriceBookAnswer,
  PriceBookEdit,
  PriceHistory,
} from './pricing.dto.js';

const notBuilt = () => new AppError(501, 'not-built', 'This is not built yet.');

@Injectable()
export class PriceBookService {
  async get(_actor: Actor): Promise<PriceBookAnswer> {
    throw notBuilt();
  }

  async replace(_actor: Actor, _input: PriceBookEdit): Promise<PriceBookAnswer> {
    throw notBuilt();
  }

  async cataloguePrices(_actor: Actor): Promise<CataloguePrices> {
    throw notBuilt();
  }

  async setPrice(_actor: Actor, _itemId: string, _input: ItemPriceEdit): Promise<CataloguePrices> {
    throw notBuilt();
  }

  async history(_actor: Actor, _itemId: string): Promise<PriceHistory> {
    throw notBuilt();
  }
}
