import { and, arrayOverlaps, eq, isNull, ne } from 'drizzle-orm';
import type { Transaction } from '../../db/client';
import { memberships, outboxMessages, persons } from '../../db/schema';
import type { Scope } from '../auth/scope';
import type { Role } from '../change';

export interface Addressee {
  readonly id: string;
  readonly email: string;
  readonly name: string;
}

export interface Letter {
  readonly kind: string;
  readonly subject: string;
  readonly body: string;
}

const columns = { id: persons.id, email: persons.email, name: persons.name };

/** Everyone of the organisation in one of these roles, but not the actor. */
export function peopleInRoles(tx: Transaction, scope: Scope, roles: Role[]): Promise<Addressee[]> {
  return tx
    .select(columns)
    .from(memberships)
    .innerJoin(persons, eq(persons.id, memberships.personId))
    .where(
      and(
        eq(memberships.orgId, scope.orgId),
        arrayOverlaps(memberships.roles, roles),
        isNull(persons.deactivatedAt),
        scope.actor.id ? ne(persons.id, scope.actor.id) : undefined,
      ),
    );
}

export function personById(tx: Transaction, scope: Scope, id: string): Promise<Addressee[]> {
  return tx
    .select(columns)
    .from(memberships)
    .innerJoin(persons, eq(persons.id, memberships.personId))
    .where(and(eq(memberships.orgId, scope.orgId), eq(persons.id, id), isNull(persons.deactivatedAt)));
}

/** Puts letters into the outbox, in the transaction of what they tell about; the worker sends them afterwards. */
export async function enqueue(
  tx: Transaction,
  scope: Scope,
  to: readonly Addressee[],
  letter: Letter,
): Promise<void> {
  if (to.length === 0) return;
  await tx
    .insert(outboxMessages)
    .values(to.map(({ email, name }) => ({ orgId: scope.orgId, toEmail: email, toName: name, ...letter })));
}
