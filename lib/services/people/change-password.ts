import { and, eq, isNull } from 'drizzle-orm';
import { persons, sessions } from '../../../db/schema';
import { withScope, withSystem } from '../../../db/tx';
import { emitAudit } from '../../audit/emit';
import { hashPassword, passwordMatches } from '../../auth/passwords';
import { personOf, type Scope } from '../../auth/scope';
import { FettleError } from '../../errors';
import { changePasswordInput } from '../../schemas/session';
import { parseInput } from '../parse-input';

/** Sets a new password and ends every session of the person, this one too. */
export async function changePassword(scope: Scope, input: unknown): Promise<void> {
  const { current, next } = parseInput(changePasswordInput, input);
  const { id } = personOf(scope);
  const [row] = await withSystem((tx) =>
    tx.select({ passwordHash: persons.passwordHash }).from(persons).where(eq(persons.id, id)),
  );
  if (!(await passwordMatches(current, row?.passwordHash ?? null))) {
    const message = 'That is not your present password.';
    throw new FettleError('FORBIDDEN', message, { fields: [{ path: 'current', message }] });
  }
  const passwordHash = await hashPassword(next);
  await withSystem(async (tx) => {
    await tx.update(persons).set({ passwordHash }).where(eq(persons.id, id));
    await tx
      .update(sessions)
      .set({ endedAt: new Date() })
      .where(and(eq(sessions.personId, id), isNull(sessions.endedAt)));
  });
  await withScope(scope, (tx) =>
    emitAudit(tx, scope, { action: 'password', subjectKind: 'person', subjectId: id }),
  );
}
