import {
  type Change,
  deleteRecords,
  newId,
  PLAN_SCHEMA_VERSION,
  type SheetRecord,
} from '@lampwright/geometry/plan';
import { Inject, Injectable } from '@nestjs/common';
import { PlanSheets } from '../sheets/plan-sheets.js';
import { PlanWriter, theSystem } from './plan-writer.js';

/** Puts stored sheets on the plan of their job, as changes like any other. */
@Injectable()
export class PlacedSheets extends PlanSheets {
  constructor(@Inject(PlanWriter) private readonly writer: PlanWriter) {
    super();
  }

  async place(companyId: string, jobId: string, record: SheetRecord): Promise<void> {
    await this.writer.write({ companyId, jobId }, theSystem, async ({ plan }) => {
      if (plan.has(record.id)) return [];
      const order = [...plan.values()].reduce(
        (next, other) => (other.kind === 'sheet' ? Math.max(next, other.order + 1) : next),
        0,
      );
      return [{ change: putting({ ...record, order }), label: `Added the sheet ${record.name}` }];
    });
  }

  async remove(companyId: string, jobId: string, sheetId: string): Promise<void> {
    await this.writer.write({ companyId, jobId }, theSystem, async ({ plan }) => {
      const sheet = plan.get(sheetId);
      if (sheet?.kind !== 'sheet') return [];
      const removal = deleteRecords(plan, [sheetId]);
      if (removal.kind !== 'change') throw new Error(`Sheet ${sheetId} could not be removed from its plan.`);
      return [{ change: removal.change, label: `Removed the sheet ${sheet.name}` }];
    });
  }

  async rename(companyId: string, jobId: string, sheetId: string, name: string): Promise<void> {
    await this.writer.write({ companyId, jobId }, theSystem, async ({ plan }) => {
      const sheet = plan.get(sheetId);
      if (sheet?.kind !== 'sheet' || sheet.name === name) return [];
      return [{ change: putting({ ...sheet, name }), label: `Renamed the sheet ${sheet.name} to ${name}` }];
    });
  }
}

function putting(record: SheetRecord): Change {
  return { id: newId(), schema: PLAN_SCHEMA_VERSION, put: { [record.id]: record }, remove: [] };
}
