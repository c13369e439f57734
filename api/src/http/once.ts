import { SetMetadata } from '@nestjs/common';

export const ONCE = 'lampwright:once';

/**
 * For requests about money and mail: they carry an `Idempotency-Key` header, and happen once for each key.
 * Without one 400; the same key with another body 422; while the first is at work 409; afterwards the first
 * answer again.
 */
export const Once = () => SetMetadata(ONCE, true);
