import { Module } from '@nestjs/common';
import { PlacedSheets } from '../plans/placed-sheets.js';
import { PlanStoreModule } from '../plans/plan-store.module.js';
import { PlanSheets } from './plan-sheets.js';
import { SheetOutcomes } from './sheet-outcomes.js';
import { SheetsRepository } from './sheets.repository.js';

/** The part of the sheets that the API and the worker share. */
@Module({
  imports: [PlanStoreModule],
  providers: [SheetsRepository, SheetOutcomes, { provide: PlanSheets, useExisting: PlacedSheets }],
  exports: [SheetsRepository, SheetOutcomes, PlanSheets],
})
export class SheetStoreModule {}
