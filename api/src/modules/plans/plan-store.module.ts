import { Module } from '@nestjs/common';
import { CompaniesRepository } from '../companies/companies.repository.js';
import { PlacedSheets } from './placed-sheets.js';
import { PlanDocuments } from './plan-documents.js';
import { PlanWriter } from './plan-writer.js';
import { PlansRepository } from './plans.repository.js';

/** Reading and writing plans, without HTTP: for the worker too, and for modules that write into plans. */
@Module({
  providers: [PlansRepository, PlanDocuments, PlanWriter, PlacedSheets, CompaniesRepository],
  exports: [PlansRepository, PlanDocuments, PlanWriter, PlacedSheets, CompaniesRepository],
})
export class PlanStoreModule {}
