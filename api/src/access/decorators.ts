import { createParamDecorator, type ExecutionContext, SetMetadata } from '@nestjs/common';
import type { Request } from 'express';
import { notFound, notSignedIn } from '../http/app-error.js';
import type { Actor, Person } from './actor.js';
import type { Guest } from './guest.js';
import type { Permission } from './permissions.js';

export type Access =
  | { readonly kind: 'public' }
  | { readonly kind: 'signed-in' }
  | { readonly kind: 'shared' }
  | { readonly kind: 'permission'; readonly permission: Permission };

export const ACCESS = 'lampwright:access';

/** Open to anyone, signed in or not. */
export const Public = () => SetMetadata(ACCESS, { kind: 'public' } satisfies Access);
/** Open to anyone signed in, whatever their company and role: their own account. */
export const SignedIn = () => SetMetadata(ACCESS, { kind: 'signed-in' } satisfies Access);
/** Open to whoever holds the link of a proposal; the route names it as `linkId`. */
export const Shared = () => SetMetadata(ACCESS, { kind: 'shared' } satisfies Access);
/** Open to the roles that the permission table gives this permission. */
export const Permit = (permission: Permission) =>
  SetMetadata(ACCESS, { kind: 'permission', permission } satisfies Access);

declare global {
  namespace Express {
    interface Request {
      /** Set by the access guard. */
      person?: Person;
      actor?: Actor;
      guest?: Guest;
    }
  }
}

export const CurrentActor = createParamDecorator((_: unknown, context: ExecutionContext): Actor => {
  const { actor } = context.switchToHttp().getRequest<Request>();
  if (!actor) throw notSignedIn();
  return actor;
});

export const CurrentPerson = createParamDecorator((_: unknown, context: ExecutionContext): Person => {
  const { person } = context.switchToHttp().getRequest<Request>();
  if (!person) throw notSignedIn();
  return person;
});

export const CurrentGuest = createParamDecorator((_: unknown, context: ExecutionContext): Guest => {
  const { guest } = context.switchToHttp().getRequest<Request>();
  if (!guest) throw notFound('This proposal');
  return guest;
});
