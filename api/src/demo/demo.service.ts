import { createReadStream } from 'node:fs';
import { fileURLToPath } from 'node:url';
import { recordsOf } from '@lampwright/geometry/plan';
import { Inject, Injectable } from '@nestjs/common';
import { hashPassword } from '../access/password.js';
import { Database } from '../database/database.js';
import { ProcessSheet } from '../jobs/sheets.js';
import { SummarisePlan } from '../jobs/summarise-plan.js';
import { CatalogueService } from '../modules/catalogue/catalogue.service.js';
import { PlanWriter } from '../modules/plans/plan-writer.js';
import { CompanyTexts } from '../modules/proposals/company-texts.js';
import { originalKey } from '../modules/sheets/sheet-keys.js';
import { SheetsRepository } from '../modules/sheets/sheets.repository.js';
import { ObjectStorage } from '../ports/storage/storage.js';
import { DemoRepository } from './demo.repository.js';
import { type Catalogue, PlanBuilder } from './plan-builder.js';
import { DemoPrices } from './prices/demo-prices.js';
import {
  DEMO_PASSWORD,
  type DemoSheet,
  demoCompany,
  demoDesigner,
  demoSheets,
  demoTexts,
} from './scenario.js';

/** The files that came with the demo, read from the sources by the built program too. */
const FILES = new URL('../../src/demo/files/', import.meta.url);

/**
 * Loads the demo company. Each step finds out whether it is done already: a load that was broken off is
 * completed by the next, and what people changed or removed since stays as they left it.
 */
@Injectable()
export class DemoService {
  constructor(
    @Inject(Database) private readonly database: Database,
    @Inject(DemoRepository) private readonly demo: DemoRepository,
    @Inject(CatalogueService) private readonly catalogue: CatalogueService,
    @Inject(SheetsRepository) private readonly sheets: SheetsRepository,
    @Inject(ObjectStorage) private readonly storage: ObjectStorage,
    @Inject(ProcessSheet) private readonly process: ProcessSheet,
    @Inject(PlanWriter) private readonly writer: PlanWriter,
    @Inject(SummarisePlan) private readonly summaries: SummarisePlan,
    @Inject(DemoPrices) private readonly prices: DemoPrices,
    @Inject(CompanyTexts) private readonly texts: CompanyTexts,
  ) {}

  async load(now: Date): Promise<void> {
    const passwordHash = await hashPassword(DEMO_PASSWORD);
    await this.database.transaction(async () => {
      if (await this.demo.exists()) return;
      await this.demo.insertPeople(passwordHash, now);
      await this.catalogue.seed(demoCompany.id);
      await this.demo.insertJobs(now);
    });
    await this.prices.loadCompany();
    // Does nothing for a company that has texts of its own.
    await this.texts.save(demoCompany.id, 0, demoTexts);
    for (const sheet of demoSheets) {
      await this.loadSheet(sheet);
      await this.drawPlan(sheet);
    }
  }

  /** Takes the file in by the same way as an upload, without waiting for a worker. */
  private async loadSheet({ id, jobId, name, view, file }: DemoSheet): Promise<void> {
    const companyId = demoCompany.id;
    const present = await this.sheets.find(companyId, id);
    if (present?.status === 'ready' || (present && present.archivedAt !== null)) return;
    const key = originalKey(companyId, id);
    await this.storage.put(
      key,
      createReadStream(fileURLToPath(new URL(file, FILES))),
      'application/octet-stream',
    );
    if (present) await this.sheets.update(companyId, id, { status: 'uploaded', originalKey: key });
    else {
      const uploadedBy = demoDesigner.id;
      await this.sheets.insert(companyId, { id, jobId, name, view, originalKey: key, uploadedBy });
    }
    await this.process.handle({ companyId, sheetId: id });
    const made = await this.sheets.find(companyId, id);
    if (made?.status !== 'ready')
      throw new Error(
        `The demo sheet "${name}" was not made: ${made?.failure ?? made?.status ?? 'it is gone'}`,
      );
  }

  private async drawPlan({ id: sheetId, jobId, draw, pricing }: DemoSheet): Promise<void> {
    const key = { companyId: demoCompany.id, jobId };
    const catalogue = await this.catalogueByName();
    const author = { userId: demoDesigner.id, session: '' };
    const drawn = await this.writer.write(key, author, async ({ plan }) => {
      // Anything beyond the sheet and the settings: drawn already, or changed by people since.
      if (plan.get(sheetId)?.kind !== 'sheet' || [...recordsOf(plan, 'item')].length > 0) return [];
      const builder = new PlanBuilder(plan, sheetId, catalogue, 'demo');
      draw(builder);
      return builder.changes.map((change) => ({ change }));
    });
    await this.prices.loadJob(key, drawn.plan, pricing);
    await this.summaries.handle(key);
  }

  private async catalogueByName(): Promise<Catalogue> {
    const items = await this.catalogue.byName(demoCompany.id);
    return (name) => {
      const found = items.get(name);
      if (!found) throw new Error(`The demo company's catalogue has no "${name}".`);
      return found;
    };
  }
}
