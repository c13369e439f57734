import { createHash } from 'node:crypto';
import {
  type CallHandler,
  type ExecutionContext,
  Inject,
  Injectable,
  type NestInterceptor,
} from '@nestjs/common';
import { Reflector } from '@nestjs/core';
import type { Request, Response } from 'express';
import { from, lastValueFrom, type Observable } from 'rxjs';
import { Database } from '../database/database.js';
import { AppError, conflict } from './app-error.js';
import { canonicalJson } from './canonical-json.js';
import { ONCE, type OnceMode } from './once.js';
import { companyScope, type OnceAnswer, OnceRepository, type OnceRequest } from './once.repository.js';

const HEADER = 'Idempotency-Key';
/** Printable ASCII. */
const KEY = /^[\x20-\x7e]{1,200}$/;
/** A request in steps that has no answer after this long has died: longer than any of them may take. */
const DEAD_AFTER_MILLISECONDS = 2 * 60_000;
const KEPT_MILLISECONDS = 30 * 24 * 3_600_000;

/** Stands around the handlers of `@Once()` routes. */
@Injectable()
export class OnceInterceptor implements NestInterceptor {
  constructor(
    @Inject(Reflector) private readonly reflector: Reflector,
    @Inject(Database) private readonly database: Database,
    @Inject(OnceRepository) private readonly repository: OnceRepository,
  ) {}

  intercept(context: ExecutionContext, next: CallHandler): Observable<unknown> {
    const mode = this.reflector.get<OnceMode | undefined>(ONCE, context.getHandler());
    if (mode === undefined) return next.handle();
    const request = context.switchToHttp().getRequest<Request>();
    const response = context.switchToHttp().getResponse<Response>();
    const once = onceOf(request);
    const act = async (): Promise<OnceAnswer> => {
      const body: unknown = await lastValueFrom(next.handle(), { defaultValue: undefined });
      // Nest sets the route's status before the handler runs.
      return { status: response.statusCode, body: body ?? null };
    };
    const answering = async () => {
      const { status, body } = await this.answer(mode, once, act);
      response.status(status);
      return body ?? undefined;
    };
    return from(answering());
  }

  private answer(mode: OnceMode, once: OnceRequest, act: () => Promise<OnceAnswer>): Promise<OnceAnswer> {
    switch (mode) {
      case 'whole':
        return this.database.transaction(() => this.whole(once, act));
      case 'in-steps':
        return this.inSteps(once, act);
    }
  }

  private async whole(once: OnceRequest, act: () => Promise<OnceAnswer>): Promise<OnceAnswer> {
    // Held by the transaction: should this process die, the key is free again with all that was undone.
    if (!(await this.repository.hold(once))) throw inFlight();
    const before = await this.repository.find(once);
    if (before) return rememberedOrThrow(once, before);
    const answer = await act();
    await this.keep(once, answer);
    return answer;
  }

  private async inSteps(once: OnceRequest, act: () => Promise<OnceAnswer>): Promise<OnceAnswer> {
    if (!(await this.repository.begin(once))) {
      const before = await this.repository.find(once);
      if (before === null) throw inFlight();
      if (before.status !== null || before.bodyHash !== once.bodyHash) return rememberedOrThrow(once, before);
      const dead = new Date(Date.now() - DEAD_AFTER_MILLISECONDS);
      if (!(await this.repository.takeUp(once, dead))) throw inFlight();
    }
    let answer: OnceAnswer;
    try {
      answer = await act();
    } catch (error) {
      await this.repository.forget(once);
      throw error;
    }
    await this.keep(once, answer);
    return answer;
  }

  private async keep(once: OnceRequest, answer: OnceAnswer): Promise<void> {
    await this.repository.keep(once, answer);
    await this.repository.sweep(new Date(Date.now() - KEPT_MILLISECONDS));
  }
}

const inFlight = () =>
  conflict('in-flight', 'The same request is being worked on at this moment. Please wait for it.');

interface Remembered {
  readonly bodyHash: string;
  readonly status: number | null;
  readonly answer: unknown;
}

function rememberedOrThrow(once: OnceRequest, { bodyHash, status, answer }: Remembered): OnceAnswer {
  if (bodyHash !== once.bodyHash)
    throw new AppError(422, 'key-reused', `This ${HEADER} was used for another request. Please try again.`);
  if (status === null) throw inFlight();
  return { status, body: answer };
}

/** @throws AppError 400 without a usable key */
function onceOf(request: Request): OnceRequest {
  const key = request.get(HEADER);
  if (key === undefined || !KEY.test(key))
    throw new AppError(
      400,
      'no-idempotency-key',
      `This request needs the header ${HEADER} with 1 to 200 printable characters, a new one for each thing that is to happen once.`,
    );
  const route = `${request.method} ${request.originalUrl}`;
  const body = request.body === undefined ? '' : canonicalJson(request.body);
  const bodyHash = createHash('sha256').update(`${route}\n${body}`).digest('hex');
  return { scope: scopeOf(request), key, route, bodyHash };
}

function scopeOf({ actor, person, guest }: Request): string {
  if (guest) return `${companyScope(guest.companyId)}link ${guest.linkId}`;
  if (actor) return `${companyScope(actor.companyId)}user ${actor.userId}`;
  if (person) return `user ${person.userId}`;
  throw new Error('A route that is open to anyone cannot happen once: nobody is known to have asked.');
}
