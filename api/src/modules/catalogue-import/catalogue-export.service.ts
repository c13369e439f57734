import { Readable } from 'node:stream';
import { catalogueItemSchema } from '@lampwright/geometry/catalogue';
import { itemPriceSchema } from '@lampwright/geometry/price';
import { Inject, Injectable } from '@nestjs/common';
import ExcelJS from 'exceljs';
import Papa from 'papaparse';
import { type Actor, demand } from '../../access/actor.js';
import { notFound } from '../../http/app-error.js';
import type { StoredFile } from '../../http/send-file.js';
import { CatalogueRepository } from '../catalogue/catalogue.repository.js';
import { fieldNames, isMoneyField, tableFields } from '../catalogue/table/fields.js';
import { flatOfItem } from '../catalogue/table/flat-item.js';
import { flatOfPrice } from '../catalogue/table/flat-price.js';
import { CataloguePricesRepository } from '../pricing/catalogue-prices.repository.js';
import { seesCosts } from '../pricing/cost-sight.js';
import { PriceBooks } from '../pricing/price-books.js';
import type { ExportQuery } from './catalogue-import.dto.js';

/** Writes the catalogue as a table that the import reads back. */
@Injectable()
export class CatalogueExportService {
  constructor(
    @Inject(CatalogueRepository) private readonly catalogue: CatalogueRepository,
    @Inject(CataloguePricesRepository) private readonly prices: CataloguePricesRepository,
    @Inject(PriceBooks) private readonly books: PriceBooks,
  ) {}

  async write(actor: Actor, { format }: ExportQuery): Promise<StoredFile> {
    demand(actor, 'catalogue.edit');
    const inForce = await this.books.inForce(actor.companyId);
    if (!inForce) throw notFound('This company');
    const manner = { currency: inForce.currency, locale: inForce.book.locale };
    const withMoney = seesCosts(actor, inForce.book);
    const fields = fieldNames.filter((name) => withMoney || !isMoneyField(name));
    const rows = await this.catalogue.list(actor.companyId, { category: null, search: '', archived: false });
    const prices = new Map(
      (await this.prices.newest(actor.companyId)).map(({ itemId, price }) => [
        itemId,
        itemPriceSchema.parse(price),
      ]),
    );
    const table = rows.map(({ id, item }) => {
      const price = prices.get(id);
      const flat = {
        ...flatOfItem(catalogueItemSchema.parse(item)),
        ...(price ? flatOfPrice(price, manner) : {}),
        id,
      };
      return fields.map((name) => flat[name as keyof typeof flat] ?? '');
    });
    const heads = fields.map((name) => tableFields[name].header);
    const bytes = format === 'csv' ? csvOf([heads, ...table]) : await workbookOf(heads, table);
    const type =
      format === 'csv'
        ? 'text/csv; charset=utf-8'
        : 'application/vnd.openxmlformats-officedocument.spreadsheetml.sheet';
    return {
      etag: `"${Date.now()}"`,
      name: `catalogue.${format}`,
      save: true,
      open: async () => ({ stream: Readable.from([bytes]), length: bytes.length, type }),
    };
  }
}

/** With a byte order mark, by which spreadsheets know UTF-8; what could be taken for a formula is made text. */
function csvOf(rows: readonly (readonly string[])[]): Buffer {
  return Buffer.from(
    `\ufeff${Papa.unparse(
      rows.map((row) => [...row]),
      { escapeFormulae: true, newline: '\r\n' },
    )}\r\n`,
  );
}

async function workbookOf(heads: readonly string[], rows: readonly (readonly string[])[]): Promise<Buffer> {
  const workbook = new ExcelJS.Workbook();
  const sheet = workbook.addWorksheet('Catalogue', { views: [{ state: 'frozen', ySplit: 1 }] });
  sheet.addRow([...heads]).font = { bold: true };
  for (const row of rows) sheet.addRow([...row]);
  return Buffer.from(await workbook.xlsx.writeBuffer());
}
