import { Module } from '@nestjs/common';
import { AuthModule } from '../auth/auth.module.js';
import { CompaniesModule } from '../companies/companies.module.js';
import { AcceptanceService } from './acceptance.service.js';
import { InvitationsController } from './invitations.controller.js';
import { InvitationsRepository } from './invitations.repository.js';
import { InvitationsService } from './invitations.service.js';
import { MembersController } from './members.controller.js';
import { MembersService } from './members.service.js';

@Module({
  imports: [AuthModule, CompaniesModule],
  controllers: [MembersController, InvitationsController],
  providers: [MembersService, InvitationsService, AcceptanceService, InvitationsRepository],
  exports: [InvitationsRepository],
})
export class MembersModule {}
