import { randomUUID } from 'node:crypto';
import { mkdtemp, open, readFile, rm } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { type CatalogueItem, catalogueItemSchema } from '@lampwright/geometry/catalogue';
import { sameData } from '@lampwright/geometry/plan';
import { itemPriceSchema } from '@lampwright/geometry/price';
import { Inject, Injectable } from '@nestjs/common';
import { fileTypeFromFile } from 'file-type';
import { z } from 'zod';
import { type Actor, demand } from '../../access/actor.js';
import { Database } from '../../database/database.js';
import { AppError, badInput, conflict, notFound } from '../../http/app-error.js';
import { Decoder } from '../../media/decoder.js';
import { MAX_TABLE_BYTES } from '../../media/limits.js';
import { DecodeRefusal } from '../../media/task.js';
import { CatalogueRepository } from '../catalogue/catalogue.repository.js';
import { fieldNames, guessMapping, isMoneyField, tableFields } from '../catalogue/table/fields.js';
import { CataloguePricesRepository } from '../pricing/catalogue-prices.repository.js';
import { seesCosts } from '../pricing/cost-sight.js';
import { type BookInForce, PriceBooks } from '../pricing/price-books.js';
import type {
  DoneImport,
  DoneImports,
  Import,
  Preview,
  Table,
  TableUpload,
  Undone,
} from './catalogue-import.dto.js';
import { CatalogueImportsRepository, type ImportRecord } from './catalogue-imports.repository.js';
import { type ImportManner, type JudgedRow, judgeRows, type PresentItem } from './judge-rows.js';

/** What it takes to undo an import: kept with it, parsed when it is undone. */
const undoSchema = z.strictObject({
  added: z.array(z.string()),
  changed: z.array(
    z.strictObject({ id: z.string(), before: catalogueItemSchema, after: catalogueItemSchema }),
  ),
});

const tableRowsSchema = z.array(z.array(z.string())).min(2);

/** Takes tables of items and prices into the catalogue: read, preview, take in, undo. */
@Injectable()
export class CatalogueImportService {
  constructor(
    @Inject(Database) private readonly database: Database,
    @Inject(CatalogueImportsRepository) private readonly imports: CatalogueImportsRepository,
    @Inject(CatalogueRepository) private readonly catalogue: CatalogueRepository,
    @Inject(CataloguePricesRepository) private readonly prices: CataloguePricesRepository,
    @Inject(PriceBooks) private readonly books: PriceBooks,
    @Inject(Decoder) private readonly decoder: Decoder,
  ) {}

  /** Reads a file and keeps nothing of it. */
  async read(actor: Actor, { file }: TableUpload): Promise<Table> {
    demand(actor, 'catalogue.edit');
    if (file.size > MAX_TABLE_BYTES)
      throw new AppError(
        413,
        'file-too-large',
        `A table may have at most ${MAX_TABLE_BYTES / 1024 / 1024} MB. Split it in parts.`,
      );
    const [columns = [], ...rows] = await this.rowsOf(file.path);
    return {
      fileName: file.originalname.slice(-200) || 'table',
      columns,
      rows,
      mapping: guessMapping(columns),
      fields: fieldNames.map((name) => ({
        name,
        header: tableFields[name].header,
        money: isMoneyField(name),
      })),
      pricesTaken: seesCosts(actor, (await this.bookOf(actor)).book),
    };
  }

  async preview(actor: Actor, input: Import): Promise<Preview> {
    demand(actor, 'catalogue.edit');
    const judged = await this.judged(actor, input);
    return { ...countsOf(judged), rows: judged.map(({ told }) => told) };
  }

  /** Takes in every row without a fault; all of it or nothing. */
  async take(actor: Actor, input: Import): Promise<DoneImport> {
    demand(actor, 'catalogue.edit');
    const id = randomUUID();
    const record = await this.database.transaction(async () => {
      await this.imports.alone(actor.companyId);
      const judged = await this.judged(actor, input);
      const acts = judged.flatMap(({ act }) => act ?? []);
      if (acts.length === 0) throw badInput([], 'No row of this table would add or change anything.');
      const before = await this.imports.items(
        actor.companyId,
        acts.flatMap(({ itemId }) => itemId ?? []),
      );
      const undo: z.input<typeof undoSchema> = { added: [], changed: [] };
      const priced: Parameters<CatalogueImportsRepository['addPrices']>[3][number][] = [];
      const fresh: { id: string; item: CatalogueItem }[] = [];
      for (const { itemId, item, price } of acts) {
        const present = itemId === null ? null : catalogueItemSchema.parse(before.get(itemId));
        const entry = itemId ?? randomUUID();
        if (present === null) {
          fresh.push({ id: entry, item });
          undo.added.push(entry);
        } else if (!sameData(present, item)) {
          await this.catalogue.replace(actor.companyId, entry, item);
          undo.changed.push({ id: entry, before: present, after: item });
        }
        if (price) priced.push({ itemId: entry, price });
      }
      await this.imports.insertItems(actor.companyId, fresh);
      await this.imports.addPrices(actor.companyId, id, actor.userId, priced);
      const summary = countsOf(judged);
      return this.imports.insert(actor.companyId, {
        id,
        fileName: input.fileName,
        summary,
        undo,
        createdBy: actor.userId,
      });
    });
    const { items } = await this.list(actor);
    return items.find((item) => item.id === record.id) ?? doneOf({ ...record, by: null });
  }

  async list(actor: Actor): Promise<DoneImports> {
    demand(actor, 'catalogue.edit');
    return { items: (await this.imports.list(actor.companyId)).map(doneOf) };
  }

  /**
   * Takes an import back: items that it added are archived, those that it changed get what they said before,
   * unless somebody changed them since; its prices go.
   */
  async undo(actor: Actor, importId: string): Promise<Undone> {
    demand(actor, 'catalogue.edit');
    return this.database.transaction(async () => {
      await this.imports.alone(actor.companyId);
      const record = await this.imports.find(actor.companyId, importId);
      if (!record) throw notFound('This import');
      if (record.undoneAt !== null) throw conflict('already-undone', 'This import has been undone already.');
      const { added, changed } = undoSchema.parse(record.undo);
      const present = await this.imports.items(actor.companyId, [...added, ...changed.map(({ id }) => id)]);
      const kept: string[] = [];
      for (const { id, before, after } of changed) {
        const now = catalogueItemSchema.safeParse(present.get(id));
        if (now.success && sameData(now.data, after))
          await this.catalogue.replace(actor.companyId, id, before);
        else kept.push(after.name);
      }
      await this.imports.archive(
        actor.companyId,
        added.filter((id) => present.has(id)),
      );
      await this.imports.removePrices(actor.companyId, importId);
      await this.imports.markUndone(actor.companyId, importId);
      return { kept };
    });
  }

  private async judged(actor: Actor, input: Import): Promise<JudgedRow[]> {
    const { book, currency, system } = await this.bookOf(actor);
    const manner: ImportManner = {
      currency,
      locale: book.locale,
      system,
      prices: seesCosts(actor, book),
    };
    return judgeRows(input, await this.present(actor.companyId), manner);
  }

  private async present(companyId: string): Promise<PresentItem[]> {
    const rows = await this.catalogue.list(companyId, { category: null, search: '', archived: false });
    const prices = new Map(
      (await this.prices.newest(companyId)).map(({ itemId, price }) => [
        itemId,
        itemPriceSchema.parse(price),
      ]),
    );
    return rows.map(({ id, item }) => ({
      id,
      item: catalogueItemSchema.parse(item),
      price: prices.get(id) ?? null,
    }));
  }

  private async bookOf(actor: Actor): Promise<BookInForce> {
    const inForce = await this.books.inForce(actor.companyId);
    if (!inForce) throw notFound('This company');
    return inForce;
  }

  private async rowsOf(path: string): Promise<string[][]> {
    const format = await formatOf(path);
    const folder = await mkdtemp(join(tmpdir(), 'lampwright-table-'));
    try {
      const { file } = await this.decoder.run(
        { kind: 'table', input: path, folder, format },
        new AbortController().signal,
      );
      return tableRowsSchema.parse(JSON.parse(await readFile(file, 'utf8')));
    } catch (error) {
      if (error instanceof DecodeRefusal)
        throw badInput([{ pointer: '/file', detail: error.message }], error.message);
      throw error;
    } finally {
      await rm(folder, { recursive: true, force: true });
    }
  }
}

/** Judged by its first bytes. Text in UTF-16 begins with a mark that would else pass for sound. */
async function formatOf(path: string): Promise<'csv' | 'xlsx'> {
  const file = await open(path);
  const { buffer, bytesRead } = await file.read(Buffer.alloc(2), 0, 2, 0).finally(() => file.close());
  const mark = bytesRead === 2 ? buffer.readUInt16BE(0) : 0;
  if (mark === 0xfffe || mark === 0xfeff) return 'csv';
  const type = await fileTypeFromFile(path);
  if (type === undefined) return 'csv';
  if (type.ext === 'xlsx') return 'xlsx';
  throw badInput([{ pointer: '/file', detail: 'A table is a CSV file or an XLSX workbook.' }]);
}

function countsOf(judged: readonly JudgedRow[]): Omit<Preview, 'rows'> {
  const count = (action: JudgedRow['told']['action']) =>
    judged.filter(({ told }) => told.action === action).length;
  return {
    added: count('add'),
    changed: count('change'),
    same: count('same'),
    faults: count('fault'),
    leftOut: count('left-out'),
  };
}

const doneOf = ({
  id,
  fileName,
  createdAt,
  undoneAt,
  summary,
  by,
}: ImportRecord & { by: string | null }): DoneImport => ({
  id,
  fileName,
  at: createdAt.toISOString(),
  by: by ?? '',
  undoneAt: undoneAt?.toISOString() ?? null,
  summary: summary as DoneImport['summary'],
});
