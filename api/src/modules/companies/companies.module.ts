import { Module } from '@nestjs/common';
import { CompaniesController } from './companies.controller.js';
import { CompaniesRepository } from './companies.repository.js';
import { CompaniesService } from './companies.service.js';
import { ExportRepository } from './export.repository.js';
import { ExportService } from './export.service.js';

@Module({
  controllers: [CompaniesController],
  providers: [CompaniesService, CompaniesRepository, ExportService, ExportRepository],
  exports: [CompaniesService, CompaniesRepository],
})
export class CompaniesModule {}
