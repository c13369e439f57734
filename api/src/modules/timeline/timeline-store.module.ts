import { Module } from '@nestjs/common';
import { JobEvents } from './job-events.repository.js';

/** Writing the timeline, without HTTP: for the worker too. */
@Module({
  providers: [JobEvents],
  exports: [JobEvents],
})
export class TimelineStoreModule {}
