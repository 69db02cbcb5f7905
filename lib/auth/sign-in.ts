import { eq } from 'drizzle-orm';
import { RateLimiterPostgres, RateLimiterRes } from 'rate-limiter-flexible';
import { pool } from '../../db/client';
import { withSystem } from '../../db/tx';
import { memberships, persons, sessions } from '../../db/schema';
import type { Role } from '../change';
import { FettleError } from '../errors';
import { passwordMatches } from './passwords';
import { SESSION_HOURS } from './session';

const WINDOW_S = 15 * 60;
const SAME_ANSWER = 'E-mail or password is not right.';

export interface SignedIn {
  readonly sessionId: string;
  readonly who: {
    readonly person: { id: string; name: string; email: string };
    readonly roles: readonly Role[];
  };
}

interface Limits {
  account: RateLimiterPostgres;
  address: RateLimiterPostgres;
}

let limits: Limits | null = null;

function limiter(keyPrefix: string, points: number): RateLimiterPostgres {
  return new RateLimiterPostgres({
    storeClient: pool(),
    tableName: 'rate_limits',
    tableCreated: true,
    keyPrefix,
    points,
    duration: WINDOW_S,
  });
}

function signInLimits(): Limits {
  limits ??= { account: limiter('account', 10), address: limiter('address', 60) };
  return limits;
}

function tooMany(milliseconds: number): FettleError {
  const minutes = Math.max(1, Math.ceil(milliseconds / 60_000));
  return new FettleError('TOO_MANY', `Too many wrong sign-ins. Try again in ${minutes} min.`, {
    retryAfterS: milliseconds / 1000,
  });
}

async function consume(limit: RateLimiterPostgres, key: string): Promise<void> {
  try {
    await limit.consume(key);
  } catch (refused) {
    if (refused instanceof RateLimiterRes) throw tooMany(refused.msBeforeNext);
    throw refused;
  }
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
  const { account, address } = signInLimits();
  await consume(address, input.address);
  await consume(account, email);
  const [person] = await withSystem((tx) =>
    tx
      .select({
        id: persons.id,
        name: persons.name,
        roles: memberships.roles,
        passwordHash: persons.passwordHash,
        deactivatedAt: persons.deactivatedAt,
        orgId: memberships.orgId,
      })
      .from(persons)
      .innerJoin(memberships, eq(memberships.personId, persons.id))
      .where(eq(persons.email, email))
      .limit(1),
  );
  const known = person && person.deactivatedAt === null ? person : null;
  const right = await passwordMatches(input.password, known?.passwordHash ?? null);
  if (!right || !known) throw new FettleError('UNAUTHENTICATED', SAME_ANSWER);
  // Only wrong attempts stay counted; a right one does not wipe the address' record of the others.
  await Promise.all([account.delete(email), address.reward(input.address)]);
  const expiresAt = new Date(Date.now() + SESSION_HOURS * 3_600_000);
  const [session] = await withSystem((tx) =>
    tx
      .insert(sessions)
      .values({ personId: known.id, orgId: known.orgId, expiresAt })
      .returning({ id: sessions.id }),
  );
  const { id, name, roles } = known;
  return { sessionId: session.id, who: { person: { id, name, email }, roles } };
}
