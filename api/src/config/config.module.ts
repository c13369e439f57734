import { type DynamicModule, Global, Module } from '@nestjs/common';
import type { Env } from './env.js';

export const ENV = Symbol('env');

/** Gives the parsed environment to whoever injects `ENV`. */
@Global()
@Module({})
export class ConfigModule {
  static with(env: Env): DynamicModule {
    return {
      module: ConfigModule,
      providers: [{ provide: ENV, useValue: env }],
      exports: [ENV],
    };
  }
}
