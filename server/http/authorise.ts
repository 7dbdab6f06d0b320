import type { ErrorCode } from '../../shared/contracts/errors.ts';
import type { Role } from '../../shared/contracts/vocabulary.ts';
import { AppError } from '../errors.ts';
import { roleAt, type Actor } from './actor.ts';

/** A policy file is one such map: which roles may do what at the site concerned. */
export type Policy<Action extends string = string> = Readonly<Record<Action, readonly Role[]>>;

export const everyRole: readonly Role[] = ['technician', 'manager', 'operator', 'auditor', 'administrator'];

export function may<Action extends string>(
  policy: Policy<Action>,
  action: Action,
  actor: Pick<Actor, 'grants'>,
  siteId: number | null,
): boolean {
  const role = roleAt(actor, siteId);
  return role !== null && policy[action].includes(role);
}

/** True when the actor may do it at one site at least: decides whether a control is offered at all. */
export function maySomewhere<Action extends string>(
  policy: Policy<Action>,
  action: Action,
  actor: Pick<Actor, 'grants'>,
): boolean {
  return actor.grants.some((grant) => policy[action].includes(grant.role));
}

/**
 * Refuses with `notFound` when the actor may not even read there (so that ids of other sites cannot be told
 * from missing ones), with `forbidden` when the role does not allow the action.
 */
export function authorise<Action extends string>(
  policy: Policy<Action | 'read'>,
  action: Action | 'read',
  actor: Actor,
  siteId: number | null,
  codes: { notFound: ErrorCode; forbidden: ErrorCode },
): void {
  if (!may(policy, 'read', actor, siteId)) throw new AppError(codes.notFound);
  if (!may(policy, action, actor, siteId)) throw new AppError(codes.forbidden);
}
