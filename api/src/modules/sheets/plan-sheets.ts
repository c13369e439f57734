import type { SheetRecord } from '@lampwright/geometry/plan';

/** What the sheets need of the plan. Both calls join the running transaction and may be repeated. */
export abstract class PlanSheets {
  /** Puts the sheet's record into the plan of its job. */
  abstract place(companyId: string, jobId: string, record: SheetRecord): Promise<void>;
  /** Takes the sheet's record out, with all that is drawn on it. */
  abstract remove(companyId: string, jobId: string, sheetId: string): Promise<void>;
  /** Gives the sheet's record its new name. */
  abstract rename(companyId: string, jobId: string, sheetId: string, name: string): Promise<void>;
}
