import { notAllowed } from '../http/app-error.js';
import { allows, type Permission, type Role } from './permissions.js';

/** A signed-in person, whatever company is active. */
export interface Person {
  readonly userId: string;
  readonly sessionId: string;
}

/** A signed-in person acting for a company. Services take it first, and check permission first. */
export interface Actor extends Person {
  readonly companyId: string;
  readonly role: Role;
}

/** @throws AppError 403 when the actor's role does not have the permission */
export function demand(actor: Actor, permission: Permission): void {
  if (!allows(actor.role, permission)) throw notAllowed();
}
