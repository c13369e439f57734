import { PLAN_SCHEMA_VERSION, type SheetRecord } from '@lampwright/geometry/plan';
import { Inject, Injectable } from '@nestjs/common';
import { Database } from '../../database/database.js';
import { PlanSheets } from './plan-sheets.js';

/** Writes sheet records straight into the plan's tables. */
@Injectable()
export class DirectPlanSheets extends PlanSheets {
  constructor(@Inject(Database) private readonly database: Database) {
    super();
  }

  async place(companyId: string, jobId: string, record: SheetRecord): Promise<void> {
    await this.database.executeSql(
      `INSERT INTO plans (company_id, job_id, schema_version) VALUES ($1, $2, $3) ON CONFLICT DO NOTHING`,
      [companyId, jobId, PLAN_SCHEMA_VERSION],
    );
    await this.change(companyId, jobId, `sheet-${record.id}`, { [record.id]: record });
  }

  async remove(): Promise<void> {}

  async rename(): Promise<void> {}

  private async change(companyId: string, jobId: string, id: string, put: Record<string, SheetRecord>) {
    await this.database.executeSql(
      `WITH p AS (UPDATE plans SET version = version + 1 WHERE company_id = $1 AND job_id = $2
                  AND NOT EXISTS (SELECT FROM plan_changes WHERE company_id = $1 AND job_id = $2 AND change_id = $3)
                  RETURNING version),
            c AS (INSERT INTO plan_changes (company_id, job_id, version, change_id, schema_version, put, remove)
                  SELECT $1, $2, version, $3, $4, $5, '[]' FROM p)
       INSERT INTO plan_records (company_id, job_id, record_id, record, version)
       SELECT $1, $2, key, value, version FROM p, jsonb_each($5)`,
      [companyId, jobId, id, PLAN_SCHEMA_VERSION, JSON.stringify(put)],
    );
  }
}
