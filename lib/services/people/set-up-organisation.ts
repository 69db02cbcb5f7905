import { sql } from 'drizzle-orm';
import { counters, memberships, organisations, persons } from '../../../db/schema';
import { withSystem } from '../../../db/tx';
import { emitAudit } from '../../audit/emit';
import { hashPassword } from '../../auth/passwords';
import { authorise } from '../../auth/permissions';
import { mintScope } from '../../auth/scope';
import { FettleError } from '../../errors';
import { setUpInput } from '../../schemas/session';
import { parseInput } from '../parse-input';

const LOCK = 715_230_612;

/**
 * First run: the organisation and its admin, into a database without any person.
 *
 * @throws FettleError MALFORMED, or CONFLICT when someone was there first
 */
export async function setUpOrganisation(input: unknown): Promise<{ personId: string; orgId: string }> {
  const { organisation, name, email, password, onePersonShop } = parseInput(setUpInput, input);
  const passwordHash = await hashPassword(password);
  return withSystem(async (tx) => {
    await tx.execute(sql`select pg_advisory_xact_lock(${LOCK})`);
    const someone = await tx.select({ id: persons.id }).from(persons).limit(1);
    if (someone.length > 0)
      throw new FettleError('CONFLICT', 'This installation is already set up. Sign in instead.');
    const [org] = await tx
      .insert(organisations)
      .values({ name: organisation, onePersonShop })
      .returning({ id: organisations.id });
    const [person] = await tx
      .insert(persons)
      .values({ name, email: email.toLowerCase(), passwordHash })
      .returning({ id: persons.id });
    // The first person does everything until others are invited.
    const roles = ['admin', 'engineer', 'approver', 'technician'] as const;
    await tx.insert(memberships).values({ orgId: org.id, personId: person.id, roles: [...roles] });
    await tx.insert(counters).values({ orgId: org.id });
    const scope = mintScope(org.id, {
      kind: 'person',
      id: person.id,
      name,
      roles: [...roles],
      onePersonShop,
    });
    await emitAudit(tx, authorise(scope, 'organisation.set-up'), {
      action: 'set-up',
      subjectKind: 'organisation',
      subjectId: org.id,
      detail: { organisation, onePersonShop },
    });
    return { personId: person.id, orgId: org.id };
  });
}
