import { asc, eq } from 'drizzle-orm';
import { withSystem } from '../../db/tx';
import { memberships, organisations, persons, sessions } from '../../db/schema';
import { emitAudit } from '../audit/emit';
import type { Role } from '../change';
import { FettleError } from '../errors';
import { countAttempt, forgetAttempt } from './attempts';
import { passwordMatches } from './passwords';
import { authorise } from './permissions';
import { mintScope } from './scope';
import { SESSION_HOURS } from './session';

const SAME_ANSWER = 'E-mail or password is not right.';

export interface SignedIn {
  readonly sessionId: string;
  readonly who: {
    readonly person: { id: string; name: string; email: string };
    readonly roles: readonly Role[];
  };
}

type Account = NonNullable<Awaited<ReturnType<typeof findAccount>>>;

/** The account behind an e-mail, with the first of its organisations. */
async function findAccount(email: string) {
  const [account] = await withSystem((tx) =>
    tx
      .select({
        id: persons.id,
        name: persons.name,
        passwordHash: persons.passwordHash,
        deactivatedAt: persons.deactivatedAt,
        orgId: organisations.id,
        onePersonShop: organisations.onePersonShop,
        roles: memberships.roles,
      })
      .from(persons)
      .innerJoin(memberships, eq(memberships.personId, persons.id))
      .innerJoin(organisations, eq(organisations.id, memberships.orgId))
      .where(eq(persons.email, email))
      .orderBy(asc(organisations.createdAt), asc(organisations.id))
      .limit(1),
  );
  return account && account.deactivatedAt === null ? account : null;
}

async function openSession({ id, name, roles, orgId, onePersonShop }: Account): Promise<string> {
  const expiresAt = new Date(Date.now() + SESSION_HOURS * 3_600_000);
  const scope = mintScope(orgId, { kind: 'person', id, name, roles, onePersonShop });
  return withSystem(async (tx) => {
    const [session] = await tx
      .insert(sessions)
      .values({ personId: id, orgId, expiresAt })
      .returning({ id: sessions.id });
    await emitAudit(tx, authorise(scope, 'account.own'), {
      action: 'sign-in',
      subjectKind: 'person',
      subjectId: id,
    });
    return session.id;
  });
}

/**
 * Opens a session for an account and its password. Every attempt counts against account and address until one is
 * right; an unknown account gets the same answer, as late, as a wrong password.
 *
 * @returns the id of the session, and who signed in
 * @throws FettleError UNAUTHENTICATED or TOO_MANY
 */
export async function signIn(input: { email: string; password: string; address: string }): Promise<SignedIn> {
  const email = input.email.trim().toLowerCase();
  await countAttempt(email, input.address);
  const account = await findAccount(email);
  const isRight = await passwordMatches(input.password, account?.passwordHash ?? null);
  if (!isRight || !account) throw new FettleError('UNAUTHENTICATED', SAME_ANSWER);
  await forgetAttempt(email, input.address);
  const sessionId = await openSession(account);
  const { id, name, roles } = account;
  return { sessionId, who: { person: { id, name, email }, roles } };
}
