import { RateLimiterPostgres, RateLimiterRes } from 'rate-limiter-flexible';
import { pool } from '../../db/client';
import { FettleError } from '../errors';

const WINDOW_S = 15 * 60;
const PER_ACCOUNT = 10;
const PER_ADDRESS = 60;

interface Limits {
  readonly account: RateLimiterPostgres;
  readonly address: RateLimiterPostgres;
}

let held: Limits | null = null;

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

function limits(): Limits {
  held ??= { account: limiter('account', PER_ACCOUNT), address: limiter('address', PER_ADDRESS) };
  return held;
}

async function consume(limit: RateLimiterPostgres, key: string): Promise<void> {
  try {
    await limit.consume(key);
  } catch (refused) {
    if (!(refused instanceof RateLimiterRes)) throw refused;
    const minutes = Math.max(1, Math.ceil(refused.msBeforeNext / 60_000));
    throw new FettleError('TOO_MANY', `Too many wrong passwords. Try again in ${minutes} min.`, {
      retryAfterS: refused.msBeforeNext / 1000,
    });
  }
}

/**
 * Counts one use of an account's password, before it is looked at, against the account and, where it is known, the
 * address it comes from.
 *
 * @throws FettleError TOO_MANY
 */
export async function countAttempt(email: string, address?: string): Promise<void> {
  if (address !== undefined) await consume(limits().address, address);
  await consume(limits().account, email);
}

/** The password was right: only wrong ones stay counted. The address' record of other accounts is not wiped. */
export async function forgetAttempt(email: string, address?: string): Promise<void> {
  await limits().account.delete(email);
  if (address !== undefined) await limits().address.reward(address);
}
