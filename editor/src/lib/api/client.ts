import type { z } from 'zod';
import { ApiProblem, problemFrom, unreachable } from './problem';

export { ApiProblem, type FieldFault, isAbort, sentenceOf } from './problem';

export type Query = Readonly<Record<string, string | number | boolean | null | undefined>>;
export interface CallOptions {
  readonly query?: Query;
  readonly signal?: AbortSignal;
  readonly headers?: Readonly<Record<string, string>>;
}

type Method = 'GET' | 'POST' | 'PUT' | 'PATCH' | 'DELETE';
type Listener = () => void;

const signedOutListeners = new Set<Listener>();

/** Called whenever the server says that nobody is signed in, so that the app can ask for it. Returns its own undoing. */
export function onSignedOut(listener: Listener): () => void {
  signedOutListeners.add(listener);
  return () => signedOutListeners.delete(listener);
}

export const tellSignedOut = (): void => {
  for (const listener of signedOutListeners) listener();
};

/** Address with its query; null, undefined and the empty string are left out. */
export function address(path: string, query: Query = {}): string {
  const search = new URLSearchParams();
  for (const [key, value] of Object.entries(query))
    if (value !== undefined && value !== null && value !== '') search.set(key, String(value));
  const text = search.toString();
  return text === '' ? path : `${path}?${text}`;
}

/**
 * One call to the server. JSON in (or a form with files), JSON out, unparsed.
 * @throws ApiProblem for every answer that is no success, and when no answer came (status 0);
 *   DOMException AbortError when the signal aborts it.
 */
export async function send(
  method: Method,
  path: string,
  body?: unknown,
  options: CallOptions = {},
): Promise<Response> {
  const isForm = body instanceof FormData;
  const headers: Record<string, string> = { Accept: 'application/json', ...options.headers };
  if (body !== undefined && !isForm) headers['Content-Type'] = 'application/json';
  const init: RequestInit = { method, headers, credentials: 'same-origin' };
  if (body !== undefined) init.body = isForm ? body : JSON.stringify(body);
  if (options.signal) init.signal = options.signal;

  let response: Response;
  try {
    response = await fetch(address(path, options.query), init);
  } catch (error) {
    // fetch rejects with TypeError when the network fails; an abort passes through as it is.
    if (error instanceof TypeError) throw unreachable();
    throw error;
  }
  if (response.ok) return response;
  const problem = problemFrom(response.status, await jsonOf(response));
  // A wrong password also answers 401, but only a missing session says so by this code.
  if (problem.status === 401 && problem.code === 'not-signed-in') tellSignedOut();
  throw problem;
}

async function jsonOf(response: Response): Promise<unknown> {
  const text = await response.text();
  if (text === '') return null;
  try {
    return JSON.parse(text);
  } catch {
    return null;
  }
}

/** Parses an answer at the edge, so that everything inside may trust its shape. */
function parse<T>(schema: z.ZodType<T>, path: string, value: unknown): T {
  const parsed = schema.safeParse(value);
  if (parsed.success) return parsed.data;
  const first = parsed.error.issues[0];
  const where = first ? `${first.path.join('.')}: ${first.message}` : '';
  throw new ApiProblem(
    200,
    'unreadable-answer',
    'The server answered in a way that this window does not understand. Reload the page: it may be out of date.',
    [],
    `${path} ${where}`,
  );
}

async function call<T>(
  method: Method,
  path: string,
  schema: z.ZodType<T>,
  body?: unknown,
  options?: CallOptions,
): Promise<T> {
  return parse(schema, path, await jsonOf(await send(method, path, body, options)));
}

/** Calls with an answer that is read. */
export const get = <T>(path: string, schema: z.ZodType<T>, options?: CallOptions) =>
  call('GET', path, schema, undefined, options);
export const post = <T>(path: string, body: unknown, schema: z.ZodType<T>, options?: CallOptions) =>
  call('POST', path, schema, body, options);
export const put = <T>(path: string, body: unknown, schema: z.ZodType<T>, options?: CallOptions) =>
  call('PUT', path, schema, body, options);
export const patch = <T>(path: string, body: unknown, schema: z.ZodType<T>, options?: CallOptions) =>
  call('PATCH', path, schema, body, options);

/** A call of which only success matters. */
export async function act(
  method: Exclude<Method, 'GET'>,
  path: string,
  body?: unknown,
  options?: CallOptions,
): Promise<void> {
  await send(method, path, body, options);
}
