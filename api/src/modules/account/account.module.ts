import { Module } from '@nestjs/common';
import { AuthModule } from '../auth/auth.module.js';
import { MembersModule } from '../members/members.module.js';
import { AccountController } from './account.controller.js';
import { AccountService } from './account.service.js';

@Module({
  imports: [AuthModule, MembersModule],
  controllers: [AccountController],
  providers: [AccountService],
})
export class AccountModule {}
