/** One fault of the input, by JSON pointer (RFC 6901). */
export interface FieldFault {
  readonly pointer: string;
  readonly detail: string;
}

/** An error with a code for programs and a sentence for people; becomes problem details at the edge. */
export class AppError extends Error {
  constructor(
    readonly status: number,
    readonly code: string,
    message: string,
    readonly extra: Readonly<Record<string, unknown>> = {},
    readonly headers: Readonly<Record<string, string>> = {},
  ) {
    super(message);
  }
}

export const badInput = (errors: readonly FieldFault[], message = 'Some values need attention.') =>
  new AppError(400, 'bad-input', message, { errors });
export const notSignedIn = (message = 'Please sign in.') => new AppError(401, 'not-signed-in', message);
export const notAllowed = (message = 'Your role in this company does not allow this.') =>
  new AppError(403, 'not-allowed', message);
export const notFound = (what = 'This') =>
  new AppError(404, 'not-found', `${what} does not exist, or is not yours to see.`);
export const conflict = (code: string, message: string, extra: Record<string, unknown> = {}) =>
  new AppError(409, code, message, extra);
