import { Module } from '@nestjs/common';
import { CompaniesRepository } from './companies.repository.js';

@Module({
  providers: [CompaniesRepository],
  exports: [CompaniesRepository],
})
export class CompaniesModule {}
