import { and, desc, eq } from 'drizzle-orm';
import type { Scope } from '../../lib/auth/scope';
import type { Role } from '../../lib/change';
import type { Transaction } from '../client';
import { apiTokens, persons } from '../schema';

export interface TokenLine {
  readonly id: string;
  readonly personId: string;
  readonly personName: string;
  readonly name: string;
  readonly role: Role;
  readonly createdAt: Date;
  readonly expiresAt: Date;
  readonly lastUsedAt: Date | null;
  readonly revokedAt: Date | null;
}

/** API tokens, newest first: those of one person, or all of the organisation. The tokens themselves are never read. */
export async function listTokens(
  tx: Transaction,
  scope: Scope,
  params: { personId?: string } = {},
): Promise<TokenLine[]> {
  const { id, personId, name, role, createdAt, expiresAt, lastUsedAt, revokedAt } = apiTokens;
  return tx
    .select({
      id,
      personId,
      personName: persons.name,
      name,
      role,
      createdAt,
      expiresAt,
      lastUsedAt,
      revokedAt,
    })
    .from(apiTokens)
    .innerJoin(persons, eq(persons.id, apiTokens.personId))
    .where(and(eq(apiTokens.orgId, scope.orgId), params.personId ? eq(personId, params.personId) : undefined))
    .orderBy(desc(createdAt), desc(id));
}
