import { and, eq } from 'drizzle-orm';
import { changes } from '../../../db/schema';
import { withScope } from '../../../db/tx';
import { emitAudit } from '../../audit/emit';
import { authorise } from '../../auth/permissions';
import type { Scope } from '../../auth/scope';
import { diffValues, permittedStep } from '../../change';
import { FettleError } from '../../errors';
import { updateChangeInput } from '../../schemas/change';
import { parseInput } from '../parse-input';
import { changeName, contentHash, loadAxis, loadChange, loadGainSet } from './content';

/**
 * Edits a draft or a returned change; its baseline becomes what is in service now.
 *
 * @throws FettleError FORBIDDEN, MALFORMED, NOT_FOUND, or CONFLICT by state or when edited elsewhere meanwhile
 */
export async function updateChange(scope: Scope, id: string, input: unknown): Promise<{ id: string }> {
  authorise(scope, 'change.draft');
  const { rowVersion, temporaryUntil, ...words } = parseInput(updateChangeInput, input);
  return withScope(scope, async (tx) => {
    const change = await loadChange(tx, scope, id);
    const { roles, onePersonShop } = scope.actor;
    const isAuthor = change.authorId === scope.actor.id;
    const step = permittedStep({ state: change.state, action: 'edit', roles, isAuthor, onePersonShop });
    if (!step.ok) throw new FettleError(step.code === 'WRONG_STATE' ? 'CONFLICT' : 'FORBIDDEN', step.message);
    const axis = await loadAxis(tx, scope, change.axisId);
    const from = axis.inServiceGainSetId ? await loadGainSet(tx, scope, axis.inServiceGainSetId) : null;
    const to = await loadGainSet(tx, scope, change.toGainSetId);
    const content = { ...words, temporaryUntil: temporaryUntil ? new Date(temporaryUntil) : null };
    const hash = contentHash(
      { ...content, number: change.number, axisId: axis.id },
      from?.digest ?? null,
      to.digest,
    );
    const changed = await tx
      .update(changes)
      .set({
        ...content,
        fromGainSetId: from?.id ?? null,
        contentHash: hash,
        rowVersion: rowVersion + 1,
        changedAt: new Date(),
      })
      .where(
        and(
          eq(changes.orgId, scope.orgId),
          eq(changes.id, change.id),
          eq(changes.rowVersion, rowVersion),
          eq(changes.state, change.state),
        ),
      )
      .returning({ id: changes.id });
    if (changed.length === 0)
      throw new FettleError(
        'CONFLICT',
        'This change was edited or moved on meanwhile. Load it again and repeat your edit.',
      );
    const before = Object.fromEntries(
      Object.keys(words).map((key) => [key, change[key as keyof typeof words]]),
    );
    await emitAudit(tx, scope, {
      action: 'change.edit',
      subjectKind: 'change',
      subjectId: change.id,
      detail: { number: changeName(change.number), changes: diffValues(before, words) },
    });
    return { id: change.id };
  });
}
