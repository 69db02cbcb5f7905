import type { Role } from '../change';
import type { Scope } from './scope';

/** Who is signed in, where, and with which rights. */
export interface Session {
  /** Null for a bearer token. */
  readonly sessionId: string | null;
  readonly person: { readonly id: string; readonly name: string; readonly email: string };
  readonly organisation: { readonly id: string; readonly name: string; readonly onePersonShop: boolean };
  readonly roles: readonly Role[];
  readonly scope: Scope;
}
