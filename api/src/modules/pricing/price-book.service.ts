import { itemPriceSchema, type PriceBook } from '@lampwright/geometry/price';
import { Inject, Injectable } from '@nestjs/common';
import { type Actor, demand } from '../../access/actor.js';
import { Database } from '../../database/database.js';
import { badInput, conflict, type FieldFault, notAllowed, notFound } from '../../http/app-error.js';
import { CataloguePricesRepository } from './catalogue-prices.repository.js';
import { priceWithoutCost, seesCosts } from './cost-sight.js';
import { type BookInForce, PriceBooks } from './price-books.js';
import type {
  CataloguePrices,
  ItemPriceEdit,
  PriceBookAnswer,
  PriceBookEdit,
  PriceHistory,
} from './pricing.dto.js';

@Injectable()
export class PriceBookService {
  constructor(
    @Inject(Database) private readonly database: Database,
    @Inject(PriceBooks) private readonly books: PriceBooks,
    @Inject(CataloguePricesRepository) private readonly prices: CataloguePricesRepository,
  ) {}

  async get(actor: Actor): Promise<PriceBookAnswer> {
    demand(actor, 'prices.read');
    const held = await this.book(actor);
    if (!seesCosts(actor, held.book))
      throw notAllowed('Rates, overhead and markup are for the owner’s eyes in this company.');
    return answerOf(held);
  }

  /** @throws AppError 409 `price-book-conflict` with the present book, when it is not at the version edited */
  async replace(actor: Actor, { baseVersion, book }: PriceBookEdit): Promise<PriceBookAnswer> {
    demand(actor, 'price-book.edit');
    return this.database.transaction(async () => {
      const faults = await this.faultsOf(actor, book);
      if (faults.length > 0) throw badInput(faults);
      const saved = await this.books.save(actor.companyId, baseVersion, book);
      if (saved) return answerOf(saved);
      throw conflict(
        'price-book-conflict',
        'Somebody changed the price book since you opened it. Look at theirs, then save yours again.',
        { ...answerOf(await this.book(actor)) },
      );
    });
  }

  async cataloguePrices(actor: Actor): Promise<CataloguePrices> {
    demand(actor, 'prices.read');
    const { book, currency } = await this.book(actor);
    const sees = seesCosts(actor, book);
    const rows = await this.prices.newest(actor.companyId);
    return {
      currency,
      locale: book.locale,
      seesCosts: sees,
      items: rows.map(({ itemId, price, createdAt }) => {
        const whole = itemPriceSchema.parse(price);
        return {
          itemId,
          price: sees ? whole : priceWithoutCost(whole),
          since: createdAt.toISOString(),
        };
      }),
    };
  }

  /** The price before is kept as history. One that is the same as before adds nothing. */
  async setPrice(actor: Actor, itemId: string, { price }: ItemPriceEdit): Promise<CataloguePrices> {
    demand(actor, 'prices.edit');
    const { book } = await this.book(actor);
    await this.database.transaction(async () => {
      if (!(await this.prices.lockItem(actor.companyId, itemId))) throw notFound('This catalogue item');
      if (!seesCosts(actor, book))
        throw notAllowed('Only those who see costs may change prices in this company.');
      const before = await this.prices.newestOf(actor.companyId, itemId);
      const same = before && isSame(itemPriceSchema.parse(before.price), price);
      if (!same) await this.prices.add(actor.companyId, [{ itemId, price }], actor.userId);
    });
    return this.cataloguePrices(actor);
  }

  async history(actor: Actor, itemId: string): Promise<PriceHistory> {
    demand(actor, 'prices.read');
    const { book } = await this.book(actor);
    if (!(await this.prices.hasItem(actor.companyId, itemId))) throw notFound('This catalogue item');
    const sees = seesCosts(actor, book);
    const rows = await this.prices.history(actor.companyId, itemId);
    return {
      items: rows.map(({ price, createdAt, by, importedFrom }) => {
        const whole = itemPriceSchema.parse(price);
        return {
          price: sees ? whole : priceWithoutCost(whole),
          since: createdAt.toISOString(),
          by: by ?? '',
          importedFrom,
        };
      }),
    };
  }

  private async book(actor: Actor): Promise<BookInForce> {
    const held = await this.books.inForce(actor.companyId);
    if (!held) throw notFound('This company');
    return held;
  }

  /** What the shape of a book alone can't tell: whether what it names is there. */
  private async faultsOf(actor: Actor, book: PriceBook): Promise<FieldFault[]> {
    const faults: FieldFault[] = [];
    const taxIds = book.taxes.map(({ id }) => id);
    taxIds.forEach((id, i) => {
      if (taxIds.indexOf(id) !== i)
        faults.push({ pointer: `/book/taxes/${i}/id`, detail: 'Two taxes have the same id.' });
    });
    if (book.defaultTaxId !== null && !taxIds.includes(book.defaultTaxId))
      faults.push({ pointer: '/book/defaultTaxId', detail: 'There is no such tax in this price book.' });
    if (!isLocale(book.locale))
      faults.push({ pointer: '/book/locale', detail: 'A locale looks like en-US.' });
    const items = new Map((await this.prices.items(actor.companyId)).map(({ id, item }) => [id, item]));
    const named = (id: string | null, pointer: string, category: string, use?: string) => {
      if (id === null) return;
      const item = items.get(id) as { category: string; use?: string } | undefined;
      if (!item) faults.push({ pointer, detail: 'This item is not in your catalogue.' });
      else if (item.category !== category || (use !== undefined && item.use !== use))
        faults.push({ pointer, detail: 'This catalogue item is of another kind.' });
    };
    for (const [use, id] of Object.entries(book.parts)) named(id, `/book/parts/${use}`, 'part', use);
    named(book.controlItemId, '/book/controlItemId', 'control');
    return faults;
  }
}

const answerOf = ({ version, book, currency }: BookInForce): PriceBookAnswer => ({ version, book, currency });

/** Both come out of the same schema, and so have their keys in the same order. */
const isSame = (a: unknown, b: unknown): boolean => JSON.stringify(a) === JSON.stringify(b);

function isLocale(locale: string): boolean {
  try {
    return Intl.getCanonicalLocales(locale).length > 0;
  } catch {
    return false;
  }
}
