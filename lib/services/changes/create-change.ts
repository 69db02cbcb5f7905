import { eq, sql } from 'drizzle-orm';
import { changes, counters } from '../../../db/schema';
import { withScope } from '../../../db/tx';
import { contentHash } from '../../audit/digest';
import { emitAudit } from '../../audit/emit';
import { authorise } from '../../auth/permissions';
import { personOf, type Scope } from '../../auth/scope';
import { FettleError } from '../../errors';
import { createChangeInput } from '../../schemas/change';
import { parseInput } from '../parse-input';
import { appendEvent } from './append-event';
import { changeName, endOfTemporary, loadAxis, loadGainSet } from './content';

/**
 * Drafts a change from the version in service to another kept version of the same axis.
 *
 * @throws FettleError FORBIDDEN, MALFORMED, NOT_FOUND, or INVALID when the version is of another axis or in service, or
 *   the change ends in the past
 */
export async function createChange(scope: Scope, input: unknown): Promise<{ id: string; number: string }> {
  const permitted = authorise(scope, 'change.draft');
  const person = personOf(scope);
  const { axisId, gainSetId, temporaryUntil, ...words } = parseInput(createChangeInput, input);
  return withScope(scope, async (tx) => {
    const axis = await loadAxis(tx, scope, axisId);
    const to = await loadGainSet(tx, scope, gainSetId);
    if (to.axisId !== axis.id) throw new FettleError('INVALID', 'That version belongs to another axis.');
    if (to.id === axis.inServiceGainSetId)
      throw new FettleError('INVALID', `Version ${to.version} is already in service on ${axis.tag}.`);
    const from = axis.inServiceGainSetId ? await loadGainSet(tx, scope, axis.inServiceGainSetId) : null;
    const [{ number }] = await tx
      .update(counters)
      .set({ changeNumber: sql`${counters.changeNumber} + 1` })
      .where(eq(counters.orgId, scope.orgId))
      .returning({ number: counters.changeNumber });
    const content = {
      number,
      axisId: axis.id,
      temporaryUntil: endOfTemporary(temporaryUntil),
      ...words,
    };
    const [row] = await tx
      .insert(changes)
      .values({
        orgId: scope.orgId,
        ...content,
        fromGainSetId: from?.id ?? null,
        toGainSetId: to.id,
        state: 'draft',
        authorId: person.id,
        authorName: person.name,
        contentHash: contentHash(content, from?.digest ?? null, to.digest),
      })
      .returning();
    await appendEvent(tx, scope, row, {
      action: 'draft',
      role: 'engineer',
      meaning: null,
      remark: '',
      payload: { from: from?.version ?? null, to: to.version },
    });
    await emitAudit(tx, permitted, {
      action: 'change.draft',
      subjectKind: 'change',
      subjectId: row.id,
      detail: { number: changeName(number), axisId: axis.id, from: from?.version ?? null, to: to.version },
    });
    return { id: row.id, number: changeName(number) };
  });
}
