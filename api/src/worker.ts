import 'reflect-metadata';
import { NestFactory } from '@nestjs/core';
import { EnvError, parseEnv } from './config/env.js';
import { createLogger, NestLogger } from './http/logger.js';
import { WorkerModule } from './worker.module.js';

try {
  const env = parseEnv(process.env);
  const worker = await NestFactory.createApplicationContext(WorkerModule.with(env), {
    logger: new NestLogger(createLogger(env.LOG_LEVEL)),
    abortOnError: false,
  });
  worker.enableShutdownHooks();
} catch (error) {
  console.error(error instanceof EnvError ? error.message : error);
  process.exit(1);
}
