import { ROLES, type Role } from '../change';
import { FettleError } from '../errors';
import type { Scope } from './scope';

/**
 * Who may do what, as one table: a verb, the sentence that says it, and the roles. What is not here nobody may do.
 * The steps of a change have further rules of their own (state, author, four eyes) in lib/change.
 */
export const PERMISSIONS = {
  'machine.edit': { sentence: 'add and edit machines and axes', roles: ['engineer', 'admin'] },
  'gain-set.keep': { sentence: 'keep gains as a version', roles: ['engineer'] },
  'axis.plan': { sentence: 'set the load cases and the requirement of an axis', roles: ['engineer'] },
  'change.draft': { sentence: 'draft a change', roles: ['engineer'] },
  'change.step': { sentence: 'take a step of a change', roles: ROLES },
  'audit.read': { sentence: 'read the audit log', roles: ['engineer', 'approver', 'admin'] },
  'inbox.read': { sentence: 'read the local inbox', roles: ['admin'] },
  'token.make': { sentence: 'make API tokens', roles: ROLES },
  'token.revoke': { sentence: 'revoke API tokens, others’ than one’s own as admin', roles: ROLES },
  'account.own': { sentence: 'sign in and change the own password', roles: ROLES },
  'organisation.set-up': { sentence: 'set up the organisation', roles: ['admin'] },
} as const satisfies Record<string, { sentence: string; roles: readonly Role[] }>;

export type Permission = keyof typeof PERMISSIONS;

declare const granted: unique symbol;

/**
 * A scope whose right to a verb was checked. The audit line asks for one, and no write goes without that line: a
 * service that names no permission does not compile.
 */
export type Permitted = Scope & { readonly [granted]: true };

export function isPermitted(roles: readonly Role[], permission: Permission): boolean {
  const permitted: readonly Role[] = PERMISSIONS[permission].roles;
  return roles.some((role) => permitted.includes(role));
}

/** @throws FettleError FORBIDDEN with the reason in words */
export function authorise(scope: Scope, permission: Permission): Permitted {
  if (scope.actor.kind === 'system' || isPermitted(scope.actor.roles, permission)) return scope as Permitted;
  const { sentence, roles } = PERMISSIONS[permission];
  throw new FettleError('FORBIDDEN', `To ${sentence} one must be ${roles.join(' or ')}.`);
}
