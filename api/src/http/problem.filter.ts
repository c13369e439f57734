import { type ArgumentsHost, Catch, type ExceptionFilter, HttpException, Logger } from '@nestjs/common';
import type { Request, Response } from 'express';
import { AppError } from './app-error.js';

interface Problem {
  readonly status: number;
  readonly code: string;
  readonly detail: string;
  readonly extra: Readonly<Record<string, unknown>>;
  readonly headers: Readonly<Record<string, string>>;
}

const titles: Readonly<Record<number, string>> = {
  400: 'The request needs attention',
  401: 'Not signed in',
  403: 'Not allowed',
  404: 'Not found',
  405: 'Not possible here',
  409: 'In conflict with the present state',
  410: 'No longer there',
  413: 'Too large',
  415: 'Wrong kind of content',
  422: 'Could not be worked out',
  429: 'Too many requests',
  500: 'Something went wrong',
  503: 'Not available at the moment',
};

const plain = (status: number, code: string, detail: string): Problem => ({
  status,
  code,
  detail,
  extra: {},
  headers: {},
});

function known(error: unknown): Problem | null {
  if (error instanceof AppError)
    return {
      status: error.status,
      code: error.code,
      detail: error.message,
      extra: error.extra,
      headers: error.headers,
    };
  if (error instanceof URIError) return plain(400, 'bad-address', 'The address is malformed.');
  if (error instanceof HttpException) {
    const status = error.getStatus();
    if (status === 404) return plain(404, 'not-found', 'There is nothing at this address.');
    if (status < 500) return plain(status, 'refused', error.message);
  }
  if (UNSTORABLE_TEXT.has(databaseCode(error)))
    return plain(
      400,
      'bad-text',
      'A text holds a character that cannot be stored (U+0000 or half of a pair).',
    );
  return null;
}

/** PostgreSQL's codes for text that it cannot hold, as a column or inside of JSON. */
const UNSTORABLE_TEXT = new Set(['22021', '22P05']);

/** The database's own code, which the query builder keeps as the error's cause; empty for other errors. */
function databaseCode(error: unknown): string {
  const cause = error instanceof Error && error.cause instanceof Error ? error.cause : error;
  return cause instanceof Error && 'code' in cause && typeof cause.code === 'string' ? cause.code : '';
}

/** Every error leaves as problem details (RFC 9457); what is unforeseen is logged, and told without detail. */
@Catch()
export class ProblemFilter implements ExceptionFilter {
  private readonly logger = new Logger('http');

  catch(error: unknown, host: ArgumentsHost): void {
    const response = host.switchToHttp().getResponse<Response>();
    const request = host.switchToHttp().getRequest<Request>();
    const requestId = String(request.id ?? '');
    const problem =
      known(error) ??
      plain(
        500,
        'unexpected',
        'Something went wrong on our side. Nothing of yours was lost; please try again.',
      );
    if (problem.status >= 500) this.logger.error({ requestId, ...describe(error) }, 'request failed');
    if (response.headersSent) {
      response.destroy();
      return;
    }
    response
      .status(problem.status)
      .set({ ...problem.headers, 'Content-Type': 'application/problem+json', 'Cache-Control': 'no-store' })
      .send(
        JSON.stringify({
          type: `urn:lampwright:problem:${problem.code}`,
          title: titles[problem.status] ?? 'The request failed',
          status: problem.status,
          detail: problem.detail,
          code: problem.code,
          ...problem.extra,
          requestId,
        }),
      );
  }
}

/** Name and stack only: messages of database errors hold parameters, which may be personal. */
function describe(error: unknown): { name: string; where: string; code: string } {
  if (!(error instanceof Error)) return { name: typeof error, where: '', code: '' };
  const frames = (error.stack ?? '').split('\n').filter((line) => line.trimStart().startsWith('at '));
  return { name: error.name, where: frames.slice(0, 8).join('\n'), code: databaseCode(error) };
}
