/** What came instead of what was asked for. */
export class Trouble extends Error {
  constructor(
    /** HTTP status; 0 when no answer came. */
    readonly status: number,
    readonly code: string,
    /** A sentence to show as it is. */
    message: string,
  ) {
    super(message);
    this.name = 'Trouble';
  }
}

const ours = 'Something went wrong on our side. Please try again.';

const sentences: Readonly<Record<number, string>> = {
  429: 'Too many tries in a short time. Please wait a moment.',
  502: 'The page cannot be reached at the moment. Please try again shortly.',
  503: 'The page is not available at the moment. Please try again shortly.',
  504: 'The answer took too long. Please try again.',
};

/** Reads problem details (RFC 9457); anything else still gives a usable sentence. */
export function problemFrom(status: number, body: unknown): Trouble {
  const { code, detail, errors } = (typeof body === 'object' && body !== null ? body : {}) as Record<
    string,
    unknown
  >;
  const first: unknown = Array.isArray(errors) ? errors[0]?.detail : undefined;
  const sentence = typeof first === 'string' ? first : detail;
  return new Trouble(
    status,
    typeof code === 'string' ? code : 'unexpected',
    typeof sentence === 'string' ? sentence : (sentences[status] ?? ours),
  );
}

export const unreachable = (): Trouble =>
  new Trouble(0, 'unreachable', 'No answer came. Please check your connection and try again.');

export const problemOf = (error: unknown): Trouble =>
  error instanceof Trouble ? error : new Trouble(500, 'unexpected', ours);
