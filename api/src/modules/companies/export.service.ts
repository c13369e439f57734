import { createReadStream, createWriteStream } from 'node:fs';
import { mkdtemp, rm, stat, writeFile } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { Readable } from 'node:stream';
import { pipeline } from 'node:stream/promises';
import { createGzip } from 'node:zlib';
import { Inject, Injectable } from '@nestjs/common';
import { type Actor, demand } from '../../access/actor.js';
import { Database } from '../../database/database.js';
import { AppError, notFound } from '../../http/app-error.js';
import { ObjectStorage } from '../../ports/storage/storage.js';
import { CompaniesRepository } from './companies.repository.js';
import { ExportRepository } from './export.repository.js';
import { type TarFile, tar } from './tar.js';

export interface CompanyExport {
  readonly fileName: string;
  /** The archive (tar, gzipped). Whatever becomes of it, its temporary files go when it ends or is destroyed. */
  readonly stream: Readable;
}

/** Everything that a company has, as one archive: a JSON file a table, and the files as they are. */
@Injectable()
export class ExportService {
  constructor(
    @Inject(Database) private readonly database: Database,
    @Inject(CompaniesRepository) private readonly companies: CompaniesRepository,
    @Inject(ExportRepository) private readonly repository: ExportRepository,
    @Inject(ObjectStorage) private readonly storage: ObjectStorage,
  ) {}

  /**
   * The tables are written to a temporary folder first, from one moment of the database: no transaction stays
   * open for as long as a slow reader takes, and what fails does so before the answer begins.
   */
  async export(actor: Actor): Promise<CompanyExport> {
    demand(actor, 'company.export');
    const company = await this.companies.find(actor.companyId);
    if (!company) throw notFound('This company');
    const folder = await mkdtemp(join(tmpdir(), 'lampwright-export-'));
    try {
      const now = new Date();
      const documents = await this.writeTables(actor.companyId, folder);
      const keys = await this.listFiles(actor.companyId);
      await writeFile(join(folder, 'files.json'), `${JSON.stringify(keys, null, 1)}\n`);
      const root = `lampwright-${slug(company.name)}`;
      const files = this.filesOf(root, folder, [...documents, 'files.json'], keys);
      const archive = Readable.from(tar(files, now), { objectMode: false });
      const gzip = createGzip();
      pipeline(archive, gzip)
        .catch((error: unknown) => gzip.destroy(error instanceof Error ? error : new Error(String(error))))
        .finally(() => rm(folder, { recursive: true, force: true }));
      return { fileName: `${root}-${now.toISOString().slice(0, 10)}.tar.gz`, stream: gzip };
    } catch (error) {
      await rm(folder, { recursive: true, force: true });
      throw error;
    }
  }

  private async writeTables(companyId: string, folder: string): Promise<string[]> {
    return this.database.transaction(async () => {
      await this.repository.freeze();
      const tables = await this.repository.tables();
      for (const table of tables)
        await pipeline(
          jsonArray(this.repository.rows(companyId, table)),
          createWriteStream(join(folder, `${table}.json`)),
        );
      return tables.map((table) => `${table}.json`);
    });
  }

  private async listFiles(companyId: string): Promise<string[]> {
    try {
      const keys: string[] = [];
      for await (const key of this.storage.list(`${companyId}/`)) keys.push(key);
      return keys;
    } catch {
      throw new AppError(
        503,
        'files-unreachable',
        'The files of your company can’t be reached at the moment. Please try again in a few minutes.',
        {},
        { 'Retry-After': '120' },
      );
    }
  }

  private async *filesOf(
    root: string,
    folder: string,
    documents: readonly string[],
    keys: readonly string[],
  ): AsyncGenerator<TarFile> {
    for (const document of documents) {
      const path = join(folder, document);
      const { size } = await stat(path);
      yield { name: `${root}/${document}`, size, content: () => createReadStream(path) };
    }
    for (const key of keys) {
      const object = await this.storage.get(key);
      // Removed since it was listed.
      if (!object) continue;
      yield { name: `${root}/files/${key}`, size: object.length, content: () => object.stream };
    }
  }
}

/** Rows of JSON text as one JSON array, a row a line. */
async function* jsonArray(rows: AsyncIterable<string>): AsyncGenerator<string> {
  let before = '[\n';
  for await (const row of rows) {
    yield before + row;
    before = ',\n';
  }
  yield before === '[\n' ? '[]\n' : '\n]\n';
}

const slug = (name: string): string =>
  name
    .normalize('NFKD')
    .replace(/[^a-zA-Z0-9]+/g, '-')
    .replace(/^-+|-+$/g, '')
    .slice(0, 40)
    .toLowerCase() || 'company';
