import { arrayContains, and, asc, eq, isNull } from 'drizzle-orm';
import type { Scope } from '../../lib/auth/scope';
import type { Role } from '../../lib/change';
import type { Transaction } from '../client';
import { memberships, persons } from '../schema';

export interface PersonLine {
  readonly id: string;
  readonly name: string;
  readonly email: string;
  readonly roles: readonly Role[];
  readonly deactivatedAt: Date | null;
}

export async function listPeople(
  tx: Transaction,
  scope: Scope,
  params: { role?: Role } = {},
): Promise<PersonLine[]> {
  return tx
    .select({
      id: persons.id,
      name: persons.name,
      email: persons.email,
      roles: memberships.roles,
      deactivatedAt: persons.deactivatedAt,
    })
    .from(memberships)
    .innerJoin(persons, eq(persons.id, memberships.personId))
    .where(
      and(
        eq(memberships.orgId, scope.orgId),
        params.role ? arrayContains(memberships.roles, [params.role]) : undefined,
        params.role ? isNull(persons.deactivatedAt) : undefined,
      ),
    )
    .orderBy(asc(persons.name));
}
