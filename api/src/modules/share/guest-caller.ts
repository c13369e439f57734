import type { Request } from 'express';

/** Where a homeowner's request came from: kept as evidence with an approval. */
export interface GuestCaller {
  readonly address: string;
  readonly userAgent: string;
}

export const guestCallerOf = (request: Request): GuestCaller => ({
  address: request.ip ?? '',
  userAgent: request.get('user-agent') ?? '',
});
