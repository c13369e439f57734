import { Module } from '@nestjs/common';
import { CountersRepository } from './counters.repository.js';

/** Numbers of papers. */
@Module({
  providers: [CountersRepository],
  exports: [CountersRepository],
})
export class NumberingModule {}
