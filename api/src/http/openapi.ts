import type { INestApplication } from '@nestjs/common';
import { DocumentBuilder, type OpenAPIObject, SwaggerModule } from '@nestjs/swagger';
import { z } from 'zod';
import { SESSION_COOKIE } from '../access/cookie.js';

const convert = (schema: unknown, options: { schemaType: 'input' | 'output' }) => {
  if (!(schema instanceof z.ZodType)) return undefined;
  const { $schema: _, ...json } = z.toJSONSchema(schema, {
    target: 'draft-2020-12',
    io: options.schemaType,
    unrepresentable: 'any',
  });
  return { schema: json };
};

/** The OpenAPI 3.1 document of every route. */
export function openApiDocument(app: INestApplication): OpenAPIObject {
  const config = new DocumentBuilder()
    .setTitle('Lampwright')
    .setDescription('Plans, estimates and records of low-voltage landscape lighting. SI units throughout.')
    .setVersion('1')
    .setOpenAPIVersion('3.1.0')
    .addCookieAuth(SESSION_COOKIE)
    .build();
  return SwaggerModule.createDocument(app, config, {
    standardSchemaConverter: convert,
    operationIdFactory: (controller, method) => `${controller.replace(/Controller$/, '')}_${method}`,
  });
}

export function serveOpenApi(app: INestApplication): void {
  SwaggerModule.setup('api/docs', app, () => openApiDocument(app), {
    jsonDocumentUrl: 'api/openapi.json',
    customSiteTitle: 'Lampwright API',
  });
}
