import createClient from 'openapi-fetch';
import type { paths } from './generated/schema';
import { fetchOrProblem } from './transport';

export { ApiProblem, type FieldFault, isAbort, sentenceOf } from './problem';
export { onSignedOut } from './transport';

/**
 * The server, with every route and shape as its OpenAPI document says. A call that is answered with a
 * problem, or not at all, throws ApiProblem; an aborted one throws DOMException AbortError.
 */
export const server = createClient<paths>({
  baseUrl: globalThis.location?.origin ?? '',
  credentials: 'same-origin',
  headers: { Accept: 'application/json' },
  fetch: fetchOrProblem,
});

/** The body of a call's answer. Calls throw on failure, so there is one wherever the document promises it. */
export async function answer<T>(call: Promise<{ data?: T }>): Promise<T> {
  return (await call).data as T;
}

type Ok<Responses> = {
  [S in keyof Responses]: S extends 200 | 201 | 202
    ? Responses[S] extends { content: { 'application/json': infer Body } }
      ? Body
      : never
    : never;
}[keyof Responses];

/** What a route answers when all is well: `Answer<'/api/jobs/{id}', 'get'>`. */
export type Answer<Path extends keyof paths, Method extends keyof paths[Path]> = paths[Path][Method] extends {
  responses: infer Responses;
}
  ? Ok<Responses>
  : never;
