import { and, asc, eq } from 'drizzle-orm';
import { loadCases } from '../../../db/schema';
import { withScope } from '../../../db/tx';
import { emitAudit } from '../../audit/emit';
import { authorise } from '../../auth/permissions';
import type { Scope } from '../../auth/scope';
import { diffValues } from '../../change';
import { loadCasesInput } from '../../schemas/axis-plan';
import { parseInput } from '../parse-input';
import { editAxis } from './edit-axis';
import { storedCase, writeLoadCases } from './write-load-cases';

/**
 * Sets the load cases of an axis, each with its plant, without keeping a version.
 *
 * @throws FettleError FORBIDDEN, MALFORMED, INVALID for an impossible plant, NOT_FOUND, or CONFLICT when someone else
 *   edited the axis meanwhile
 */
export async function saveLoadCases(scope: Scope, axisId: string, input: unknown): Promise<{ id: string }> {
  const permitted = authorise(scope, 'axis.plan');
  const { loadCases: given, rowVersion } = parseInput(loadCasesInput, input);
  const cases = given.map(storedCase);
  return withScope(scope, async (tx) => {
    const { id } = await editAxis(tx, scope, axisId, rowVersion, {});
    const before = await tx
      .select({ name: loadCases.name, plant: loadCases.plant })
      .from(loadCases)
      .where(and(eq(loadCases.orgId, scope.orgId), eq(loadCases.axisId, id)))
      .orderBy(asc(loadCases.position));
    await writeLoadCases(tx, scope, id, cases);
    await emitAudit(tx, permitted, {
      action: 'edit',
      subjectKind: 'axis',
      subjectId: id,
      detail: { changes: diffValues({ loadCases: before }, { loadCases: cases }) },
    });
    return { id };
  });
}
