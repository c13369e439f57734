import { Module } from '@nestjs/common';
import { ProposalsStoreModule } from '../proposals/proposals-store.module.js';
import { TimelineController } from './timeline.controller.js';
import { TimelineRepository } from './timeline.repository.js';
import { TimelineService } from './timeline.service.js';
import { TimelineStoreModule } from './timeline-store.module.js';

/** Timeline of a job, board of jobs and the numbers, over HTTP. */
@Module({
  imports: [TimelineStoreModule, ProposalsStoreModule],
  controllers: [TimelineController],
  providers: [TimelineService, TimelineRepository],
})
export class TimelineModule {}
