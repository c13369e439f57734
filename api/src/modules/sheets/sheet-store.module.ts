import { Module } from '@nestjs/common';
import { DirectPlanSheets } from './direct-plan-sheets.js';
import { PlanSheets } from './plan-sheets.js';
import { SheetOutcomes } from './sheet-outcomes.js';
import { SheetsRepository } from './sheets.repository.js';

/** The part of the sheets that the API and the worker share. */
@Module({
  providers: [SheetsRepository, SheetOutcomes, { provide: PlanSheets, useClass: DirectPlanSheets }],
  exports: [SheetsRepository, SheetOutcomes, PlanSheets],
})
export class SheetStoreModule {}
