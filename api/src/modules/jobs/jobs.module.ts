import { Module } from '@nestjs/common';
import { ClientsModule } from '../clients/clients.module.js';
import { PropertiesModule } from '../properties/properties.module.js';
import { SheetsModule } from '../sheets/sheets.module.js';
import { TimelineStoreModule } from '../timeline/timeline-store.module.js';
import { JobListRepository } from './job-list.repository.js';
import { JobsController } from './jobs.controller.js';
import { JobsRepository } from './jobs.repository.js';
import { JobsService } from './jobs.service.js';

@Module({
  imports: [ClientsModule, PropertiesModule, SheetsModule, TimelineStoreModule],
  controllers: [JobsController],
  providers: [JobsService, JobsRepository, JobListRepository],
  exports: [JobsService],
})
export class JobsModule {}
