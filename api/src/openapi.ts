import 'reflect-metadata';
import { writeFile } from 'node:fs/promises';
import { NestFactory } from '@nestjs/core';
import { AppModule } from './app.module.js';
import { parseEnv } from './config/env.js';
import { openApiDocument } from './http/openapi.js';

/** Writes the OpenAPI document to the named file; needs neither a database nor any other service. */
const target = process.argv[2];
if (!target) {
  console.error('Say where to write the OpenAPI document: node dist/openapi.js FILE');
  process.exit(1);
}
const env = parseEnv({
  LAMPWRIGHT_MODE: 'local',
  PUBLIC_URL: 'http://127.0.0.1',
  DATABASE_URL: 'postgres://127.0.0.1/none',
  SESSION_SECRET: 'only for writing the document, never for signing',
  S3_BUCKET: 'none',
  S3_ACCESS_KEY_ID: 'none',
  S3_SECRET_ACCESS_KEY: 'none',
  SMTP_URL: 'smtp://127.0.0.1',
  MAIL_FROM: 'none@example.com',
});
const app = await NestFactory.create(AppModule.with(env), { preview: true, logger: false });
await writeFile(target, `${JSON.stringify(openApiDocument(app), null, 2)}\n`);
