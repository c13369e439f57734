import { z } from 'zod';

const fieldFaultSchema = z.object({ pointer: z.string(), detail: z.string() });
export type FieldFault = z.infer<typeof fieldFaultSchema>;

const problemSchema = z.object({
  code: z.string().catch('unexpected'),
  detail: z.string().catch('The server could not do this.'),
  errors: z.array(fieldFaultSchema).catch([]),
});

/** What the server answered instead of what was asked: problem details (RFC 9457) with our code. */
export class ApiProblem extends Error {
  constructor(
    /** HTTP status; 0 when no answer came at all. */
    readonly status: number,
    readonly code: string,
    /** A sentence to show as it is. */
    readonly detail: string,
    readonly errors: readonly FieldFault[] = [],
    /** The whole body, for the few answers that carry more (a conflict with the present state). */
    readonly body: unknown = null,
  ) {
    super(detail);
    this.name = 'ApiProblem';
  }
}

const sentences: Readonly<Record<number, string>> = {
  413: 'This is larger than the server accepts.',
  429: 'Too many tries in a short time. Please wait a moment.',
  502: 'The server is starting or cannot be reached. Please try again in a moment.',
  503: 'The server is not available at the moment. Please try again shortly.',
  504: 'The server took too long to answer. Please try again.',
};

/** Reads an error body of any kind; a body that is no problem document still gives a usable sentence. */
export function problemFrom(status: number, body: unknown): ApiProblem {
  const parsed = problemSchema.safeParse(body);
  if (parsed.success && typeof body === 'object' && body !== null && 'detail' in body)
    return new ApiProblem(status, parsed.data.code, parsed.data.detail, parsed.data.errors, body);
  return new ApiProblem(
    status,
    'unexpected',
    sentences[status] ?? 'Something went wrong on our side. Please try again.',
    [],
    body,
  );
}

export const unreachable = () =>
  new ApiProblem(0, 'unreachable', 'The server cannot be reached. Check the connection and try again.');

export const isAbort = (error: unknown): boolean =>
  error instanceof DOMException && error.name === 'AbortError';

/** The sentence to show for any error. */
export function sentenceOf(error: unknown): string {
  if (error instanceof ApiProblem) return error.detail;
  return 'Something went wrong in this window. Please try again.';
}
