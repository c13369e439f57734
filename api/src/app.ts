import 'reflect-metadata';
import { NestFactory } from '@nestjs/core';
import type { NestExpressApplication } from '@nestjs/platform-express';
import cookieParser from 'cookie-parser';
import { LinkGate } from './access/link-gate.js';
import { AppModule } from './app.module.js';
import { type Env, isLocal } from './config/env.js';
import { jsonBodies } from './http/bodies.js';
import { compressedJson } from './http/compressed-json.js';
import { editorFiles } from './http/editor-files.js';
import { createLogger, NestLogger } from './http/logger.js';
import { serveOpenApi } from './http/openapi.js';
import { ProblemFilter } from './http/problem.filter.js';
import { requestLog } from './http/request-log.js';
import { securityHeaders } from './http/security-headers.js';
import { sharePage } from './http/share-page.js';
import { validationPipe } from './http/validation.pipe.js';
import { SharePageFacts } from './modules/share/share-page-facts.js';

/** The whole HTTP application, not yet listening. */
export async function createApp(env: Env): Promise<NestExpressApplication> {
  const logger = createLogger(env.LOG_LEVEL);
  const app = await NestFactory.create<NestExpressApplication>(AppModule.with(env), {
    logger: new NestLogger(logger),
    bodyParser: false,
    abortOnError: false,
  });
  app.set('trust proxy', env.TRUST_PROXY_HOPS);
  app.disable('x-powered-by');
  app.use(requestLog(logger));
  app.use(securityHeaders(env));
  app.use(compressedJson);
  app.use(cookieParser());
  app.use(jsonBodies);
  const files = isLocal(env) ? env.EDITOR_FILES : undefined;
  app.use(sharePage(app.get(LinkGate), app.get(SharePageFacts, { strict: false }), files));
  app.use(editorFiles(files));
  app.useGlobalPipes(validationPipe());
  app.useGlobalFilters(new ProblemFilter());
  app.enableShutdownHooks();
  serveOpenApi(app);
  return app;
}
