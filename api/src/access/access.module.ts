import { Global, Module } from '@nestjs/common';
import { APP_GUARD } from '@nestjs/core';
import { PassportModule } from '@nestjs/passport';
import { SameSiteGuard } from '../http/same-site.guard.js';
import { AccessGuard } from './access.guard.js';
import { JwtStrategy } from './jwt.strategy.js';
import { SessionRepository } from './session.repository.js';

@Global()
@Module({
  imports: [PassportModule],
  providers: [
    SessionRepository,
    JwtStrategy,
    { provide: APP_GUARD, useClass: SameSiteGuard },
    { provide: APP_GUARD, useClass: AccessGuard },
  ],
  exports: [SessionRepository],
})
export class AccessModule {}
