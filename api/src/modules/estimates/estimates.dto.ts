import { estimateRequestSchema } from '@lampwright/geometry/estimate';
import type { ApiBodyOptions } from '@nestjs/swagger';
import { z } from 'zod';

type OpenApiSchema = Extract<ApiBodyOptions, { schema: unknown }>['schema'];

/**
 * The request as the OpenAPI document shows it. The route does not give this schema to the validation pipe:
 * `parseEstimateRequest` checks shape and references together and says its faults in its own sentences.
 */
export function estimateRequestForOpenApi(): OpenApiSchema {
  const { $schema: _, ...json } = z.toJSONSchema(estimateRequestSchema, {
    target: 'draft-2020-12',
    io: 'input',
  });
  return json as OpenApiSchema;
}
