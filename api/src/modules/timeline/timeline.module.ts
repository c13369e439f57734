import { Module } from '@nestjs/common';
import { TimelineController } from './timeline.controller.js';
import { TimelineService } from './timeline.service.js';
import { TimelineStoreModule } from './timeline-store.module.js';

/** Timeline of a job, board of jobs and the numbers, over HTTP. */
@Module({
  imports: [TimelineStoreModule],
  controllers: [TimelineController],
  providers: [TimelineService],
})
export class TimelineModule {}
