import { and, eq, isNull } from 'drizzle-orm';
import { persons, sessions } from '../../../db/schema';
import { withSystem } from '../../../db/tx';
import { emitAudit } from '../../audit/emit';
import { confirmPassword } from '../../auth/confirm-password';
import { hashPassword } from '../../auth/passwords';
import { authorise } from '../../auth/permissions';
import { personOf, type Scope } from '../../auth/scope';
import { FettleError } from '../../errors';
import { changePasswordInput } from '../../schemas/session';
import { parseInput } from '../parse-input';

const NOT_PRESENT = { path: 'current', message: 'That is not your present password.' };

/**
 * Sets a new password and ends every session of the person, this one too.
 *
 * @throws FettleError MALFORMED, FORBIDDEN or TOO_MANY for a wrong present password, FORBIDDEN for a bearer token,
 *   CONFLICT when the password was changed at the same moment
 */
export async function changePassword(scope: Scope, input: unknown): Promise<void> {
  const permitted = authorise(scope, 'account.own');
  const { current, next } = parseInput(changePasswordInput, input);
  const { id } = personOf(scope);
  if (scope.actor.kind !== 'person')
    throw new FettleError('FORBIDDEN', 'A token can’t change the password; sign in for that.');
  const presentHash = await confirmPassword(scope, current, NOT_PRESENT);
  const passwordHash = await hashPassword(next);
  await withSystem(async (tx) => {
    const changed = await tx
      .update(persons)
      .set({ passwordHash })
      .where(and(eq(persons.id, id), eq(persons.passwordHash, presentHash)))
      .returning({ id: persons.id });
    if (changed.length === 0)
      throw new FettleError(
        'CONFLICT',
        'Your password was changed at the same moment. Sign in with that one.',
      );
    await tx
      .update(sessions)
      .set({ endedAt: new Date() })
      .where(and(eq(sessions.personId, id), isNull(sessions.endedAt)));
    await emitAudit(tx, permitted, { action: 'password', subjectKind: 'person', subjectId: id });
  });
}
