import bcrypt from 'bcryptjs';
import { environment } from '../env';
import { FettleError } from '../errors';

/** bcrypt reads no more than this; a longer password would be cut without a word, so it is refused. */
const LONGEST_BYTES = 72;
const SHORTEST = 10;

/** What is wrong with a new password; null when it will do. */
export function passwordObjection(password: string): string | null {
  if (new TextEncoder().encode(password).length > LONGEST_BYTES)
    return 'The password is longer than 72 bytes; take a shorter one.';
  return password.length < SHORTEST ? `The password needs ${SHORTEST} characters or more.` : null;
}

export async function hashPassword(password: string): Promise<string> {
  const objection = passwordObjection(password);
  if (objection)
    throw new FettleError('INVALID', objection, { fields: [{ path: 'password', message: objection }] });
  return bcrypt.hash(password, environment().PASSWORD_COST);
}

let decoy: Promise<string> | null = null;

/**
 * Compares a password with a stored hash. Without one (an unknown account) a decoy is compared, so that the answer
 * takes as long and tells nothing.
 */
export async function passwordMatches(password: string, hash: string | null): Promise<boolean> {
  decoy ??= bcrypt.hash('no account has this password', environment().PASSWORD_COST);
  const tooLong = new TextEncoder().encode(password).length > LONGEST_BYTES;
  const matches = await bcrypt.compare(tooLong ? '' : password, hash ?? (await decoy));
  return matches && hash !== null && !tooLong;
}
