import 'reflect-metadata';
import { NestFactory } from '@nestjs/core';
import { EnvError, isLocal, parseEnv } from '../config/env.js';
import { createLogger, NestLogger } from '../http/logger.js';
import { DemoModule } from './demo.module.js';
import { DemoService } from './demo.service.js';

/** Loads the demo company into the database and storage that the settings name. Harmless when repeated. */
try {
  const env = parseEnv(process.env);
  if (!isLocal(env)) throw new EnvError('The demo company is loaded in local mode only.');
  const app = await NestFactory.createApplicationContext(DemoModule.with(env), {
    logger: new NestLogger(createLogger(env.LOG_LEVEL === 'info' ? 'warn' : env.LOG_LEVEL)),
    abortOnError: false,
  });
  await app.get(DemoService).load(new Date());
  await app.close();
  console.log('The demo company is loaded.');
} catch (error) {
  console.error(error instanceof EnvError ? error.message : error);
  process.exit(1);
}
