import { type DynamicModule, Module } from '@nestjs/common';
import { AccessModule } from './access/access.module.js';
import { ConfigModule } from './config/config.module.js';
import type { Env } from './config/env.js';
import { DatabaseModule } from './database/database.module.js';
import { HealthModule } from './modules/health/health.module.js';
import { QueueModule } from './ports/queue/queue.module.js';
import { StorageModule } from './ports/storage/storage.module.js';

/** What the HTTP process is made of. */
@Module({})
// biome-ignore lint/complexity/noStaticOnlyClass: Nest modules are classes
export class AppModule {
  static with(env: Env): DynamicModule {
    return {
      module: AppModule,
      imports: [
        ConfigModule.with(env),
        DatabaseModule,
        QueueModule,
        StorageModule,
        AccessModule,
        HealthModule,
      ],
    };
  }
}
