import { and, eq } from 'drizzle-orm';
import type { Transaction } from '../../../db/client';
import { changes } from '../../../db/schema';
import { withScope } from '../../../db/tx';
import { contentHash, type ChangeContent } from '../../audit/digest';
import { emitAudit } from '../../audit/emit';
import { authorise } from '../../auth/permissions';
import type { Scope } from '../../auth/scope';
import { diffValues } from '../../change';
import { FettleError } from '../../errors';
import { updateChangeInput } from '../../schemas/change';
import { parseInput } from '../parse-input';
import { changeName, endOfTemporary, loadAxis, loadChange, loadGainSet } from './content';
import type { ChangeRow } from './content';
import { judgeStep, recordingRefusal } from './take-step';

/** What an edit can alter, for the audit line that says from what to what. */
function edited(row: Omit<ChangeContent, 'number' | 'axisId'>) {
  const { reason, risk, test, wayBack, temporaryUntil, safetyFunction, siteReference } = row;
  const until = temporaryUntil?.toISOString() ?? null;
  return { reason, risk, test, wayBack, temporaryUntil: until, safetyFunction, siteReference };
}

/** The version in service now, from which the edited change starts. */
async function baselineOf(tx: Transaction, scope: Scope, change: ChangeRow) {
  const axis = await loadAxis(tx, scope, change.axisId);
  return axis.inServiceGainSetId ? loadGainSet(tx, scope, axis.inServiceGainSetId) : null;
}

/**
 * Edits a draft or a returned change; its baseline becomes what is in service now.
 *
 * @throws FettleError FORBIDDEN, MALFORMED, NOT_FOUND, INVALID for an end that lies in the past, or CONFLICT by state or
 *   when edited elsewhere meanwhile
 */
export async function updateChange(scope: Scope, id: string, input: unknown): Promise<{ id: string }> {
  const { rowVersion, temporaryUntil, ...words } = parseInput(updateChangeInput, input);
  const content = { ...words, temporaryUntil: endOfTemporary(temporaryUntil) };
  return recordingRefusal(scope, id, 'edit', () => {
    const permitted = authorise(scope, 'change.draft');
    return withScope(scope, async (tx) => {
      const change = await loadChange(tx, scope, id);
      judgeStep(scope, change, { action: 'edit' });
      const from = await baselineOf(tx, scope, change);
      const to = await loadGainSet(tx, scope, change.toGainSetId);
      const { number, axisId } = change;
      const hash = contentHash({ ...content, number, axisId }, from?.digest ?? null, to.digest);
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
      await emitAudit(tx, permitted, {
        action: 'change.edit',
        subjectKind: 'change',
        subjectId: change.id,
        detail: {
          number: changeName(number),
          changes: diffValues(
            { ...edited(change), from: change.fromGainSetId },
            { ...edited(content), from: from?.id ?? null },
          ),
        },
      });
      return { id: change.id };
    });
  });
}
