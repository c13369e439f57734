import { SetMetadata } from '@nestjs/common';

export const ONCE = 'lampwright:once';

/**
 * How a request happens once:
 * - whole: all that it does and its answer are one transaction, so that neither is ever without the other;
 * - in-steps: the handler commits in steps of its own, since it asks another service in between. It must be
 *   made so that running it again goes on where it stopped.
 */
export type OnceMode = 'whole' | 'in-steps';

/**
 * For requests about money and mail: they carry an `Idempotency-Key` header, and happen once for each key.
 * Without one 400; the same key with another body 422; while the first is at work 409; afterwards the first
 * answer again.
 *
 * Only success is remembered. A refusal has changed nothing, so the same key may be tried again once what
 * stood in the way is mended.
 */
export const Once = (mode: OnceMode = 'whole') => SetMetadata(ONCE, mode);
