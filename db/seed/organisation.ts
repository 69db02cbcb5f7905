import { counters, memberships, organisations, persons } from '../schema';
import { withSystem } from '../tx';
import { hashPassword } from '../../lib/auth/passwords';
import { mintScope, type Scope } from '../../lib/auth/scope';
import type { Role } from '../../lib/change';

export interface SeedPerson {
  readonly key: string;
  readonly name: string;
  readonly email: string;
  readonly roles: readonly Role[];
}

export interface SeededOrganisation {
  readonly orgId: string;
  /** Each person's scope by their key, as if they were signed in. */
  readonly scopes: Readonly<Record<string, Scope>>;
}

/** An organisation with its people, all with the same password; the ground of demo and tests. */
export async function seedOrganisation(
  name: string,
  people: readonly SeedPerson[],
  password: string,
  onePersonShop = false,
): Promise<SeededOrganisation> {
  const passwordHash = await hashPassword(password);
  return withSystem(async (tx) => {
    const [{ id: orgId }] = await tx
      .insert(organisations)
      .values({ name, onePersonShop })
      .returning({ id: organisations.id });
    await tx.insert(counters).values({ orgId });
    const scopes: Record<string, Scope> = {};
    for (const { key, name: personName, email, roles } of people) {
      const [{ id }] = await tx
        .insert(persons)
        .values({ name: personName, email, passwordHash })
        .returning({ id: persons.id });
      await tx.insert(memberships).values({ orgId, personId: id, roles: [...roles] });
      scopes[key] = mintScope(orgId, { kind: 'person', id, name: personName, roles, onePersonShop });
    }
    return { orgId, scopes };
  });
}
