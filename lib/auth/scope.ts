import type { Role } from '../change';
import { FettleError } from '../errors';

export interface Actor {
  readonly kind: 'person' | 'token' | 'system';
  /** Null only for the system. */
  readonly id: string | null;
  readonly name: string;
  readonly roles: readonly Role[];
  readonly onePersonShop: boolean;
}

declare const minted: unique symbol;

/** Organisation and actor of a request. Only the session gate, the token check and the system mint one. */
export interface Scope {
  readonly orgId: string;
  readonly actor: Actor;
  readonly [minted]: true;
}

/** For the session gate, the token check and the seed; a raw id from outside never becomes a scope. */
export function mintScope(orgId: string, actor: Actor): Scope {
  return { orgId, actor } as Scope;
}

/** The person who acts, for what only a person can do: sign, keep, enter. */
export function personOf(scope: Scope): { readonly id: string; readonly name: string } {
  const { id, name } = scope.actor;
  if (id === null) throw new FettleError('FORBIDDEN', 'Only a person can do this.');
  return { id, name };
}
