import { Module } from '@nestjs/common';
import { SheetFilesController } from './sheet-files.controller.js';
import { SheetFilesService } from './sheet-files.service.js';
import { SheetStoreModule } from './sheet-store.module.js';
import { SheetsController } from './sheets.controller.js';
import { SheetsService } from './sheets.service.js';

@Module({
  imports: [SheetStoreModule],
  controllers: [SheetsController, SheetFilesController],
  providers: [SheetsService, SheetFilesService],
  exports: [SheetsService],
})
export class SheetsModule {}
