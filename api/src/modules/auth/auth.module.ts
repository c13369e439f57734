import { Module } from '@nestjs/common';
import { CatalogueStoreModule } from '../catalogue/catalogue-store.module.js';
import { CompaniesModule } from '../companies/companies.module.js';
import { AuthController } from './auth.controller.js';
import { AuthService } from './auth.service.js';
import { Callers } from './caller.js';
import { EmailTokensRepository } from './email-tokens.repository.js';
import { MeService } from './me.service.js';
import { SessionsService } from './sessions.service.js';

@Module({
  imports: [CompaniesModule, CatalogueStoreModule],
  controllers: [AuthController],
  providers: [AuthService, MeService, SessionsService, Callers, EmailTokensRepository],
  exports: [MeService, SessionsService, Callers, EmailTokensRepository],
})
export class AuthModule {}
