import { eq } from 'drizzle-orm';
import { persons } from '../../db/schema';
import { withSystem } from '../../db/tx';
import { FettleError } from '../errors';
import { countAttempt, forgetAttempt } from './attempts';
import { passwordMatches } from './passwords';
import { personOf, type Scope } from './scope';

/**
 * Asks a signed-in person for the password again. Wrong ones count as wrong sign-ins do, so that an open screen is no
 * place to try passwords.
 *
 * @param refusal what to say, and at which field, when it is wrong
 * @returns the stored hash that the password fits
 * @throws FettleError FORBIDDEN or TOO_MANY
 */
export async function confirmPassword(
  scope: Scope,
  password: string,
  refusal: { path: string; message: string },
): Promise<string> {
  const { id } = personOf(scope);
  const [person] = await withSystem((tx) =>
    tx
      .select({ email: persons.email, passwordHash: persons.passwordHash })
      .from(persons)
      .where(eq(persons.id, id)),
  );
  await countAttempt(person.email);
  if (!(await passwordMatches(password, person.passwordHash)))
    throw new FettleError('FORBIDDEN', refusal.message, { fields: [refusal] });
  await forgetAttempt(person.email);
  return person.passwordHash;
}
