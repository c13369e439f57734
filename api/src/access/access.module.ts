import { Global, Module } from '@nestjs/common';
import { APP_GUARD } from '@nestjs/core';
import { JwtModule } from '@nestjs/jwt';
import { PassportModule } from '@nestjs/passport';
import { ENV } from '../config/config.module.js';
import type { Env } from '../config/env.js';
import { SameSiteGuard } from '../http/same-site.guard.js';
import { AccessGuard } from './access.guard.js';
import { JwtStrategy } from './jwt.strategy.js';
import { LinkGate } from './link-gate.js';
import { LinkThrottle } from './link-throttle.js';
import { LinksRepository } from './links.repository.js';
import { MembershipsRepository } from './memberships.repository.js';
import { PasswordAttemptsRepository } from './password-attempts.repository.js';
import { PasswordGate } from './password-gate.js';
import { SessionRepository } from './session.repository.js';
import { SessionCookie } from './session-cookie.js';
import { UsersRepository } from './users.repository.js';

const shared = [
  SessionRepository,
  SessionCookie,
  UsersRepository,
  MembershipsRepository,
  PasswordGate,
  LinksRepository,
  LinkGate,
];

@Global()
@Module({
  imports: [
    PassportModule,
    JwtModule.registerAsync({
      inject: [ENV],
      useFactory: (env: Env) => ({
        secret: env.SESSION_SECRET,
        signOptions: { algorithm: 'HS256' },
        verifyOptions: { algorithms: ['HS256'] },
      }),
    }),
  ],
  providers: [
    ...shared,
    PasswordAttemptsRepository,
    LinkThrottle,
    JwtStrategy,
    { provide: APP_GUARD, useClass: SameSiteGuard },
    { provide: APP_GUARD, useClass: AccessGuard },
  ],
  exports: shared,
})
export class AccessModule {}
