import { Module } from '@nestjs/common';
import { DirectPlanSheets } from './direct-plan-sheets.js';
import { PlanSheets } from './plan-sheets.js';
import { SheetFilesController } from './sheet-files.controller.js';
import { SheetFilesService } from './sheet-files.service.js';
import { SheetsController } from './sheets.controller.js';
import { SheetsRepository } from './sheets.repository.js';
import { SheetsService } from './sheets.service.js';
import { UploadInterceptor } from './upload.interceptor.js';

@Module({
  controllers: [SheetsController, SheetFilesController],
  providers: [
    SheetsService,
    SheetFilesService,
    SheetsRepository,
    UploadInterceptor,
    { provide: PlanSheets, useClass: DirectPlanSheets },
  ],
  exports: [SheetsService, SheetsRepository, PlanSheets],
})
export class SheetsModule {}
