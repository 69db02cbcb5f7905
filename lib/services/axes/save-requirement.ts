import { withScope } from '../../../db/tx';
import { emitAudit } from '../../audit/emit';
import { authorise } from '../../auth/permissions';
import type { Scope } from '../../auth/scope';
import { diffValues } from '../../change';
import { requirementInput } from '../../schemas/axis-plan';
import { parseInput } from '../parse-input';
import { editAxis } from './edit-axis';

/**
 * Sets the limits that the loop of an axis must meet, for the versions kept from now on.
 *
 * @throws FettleError FORBIDDEN, MALFORMED, NOT_FOUND, or CONFLICT when someone else edited the axis meanwhile
 */
export async function saveRequirement(scope: Scope, axisId: string, input: unknown): Promise<{ id: string }> {
  const permitted = authorise(scope, 'axis.plan');
  const { requirement, rowVersion } = parseInput(requirementInput, input);
  return withScope(scope, async (tx) => {
    const before = await editAxis(tx, scope, axisId, rowVersion, { requirement });
    await emitAudit(tx, permitted, {
      action: 'edit',
      subjectKind: 'axis',
      subjectId: before.id,
      detail: { changes: diffValues({ requirement: before.requirement }, { requirement }) },
    });
    return { id: before.id };
  });
}
