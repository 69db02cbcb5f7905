import { withScope } from '../../../db/tx';
import { emitAudit } from '../../audit/emit';
import { authorise } from '../../auth/permissions';
import type { Scope } from '../../auth/scope';
import { diffValues } from '../../change';
import { axisEdit } from '../../schemas/axis';
import { parseInput } from '../parse-input';
import { taken } from '../unique-name';
import { axisColumns } from './create-axis';
import { editAxis } from './edit-axis';

/** @throws FettleError FORBIDDEN, MALFORMED, NOT_FOUND, or CONFLICT when someone else edited it meanwhile */
export async function updateAxis(scope: Scope, id: string, input: unknown): Promise<{ id: string }> {
  const permitted = authorise(scope, 'machine.edit');
  const { rowVersion, ...values } = parseInput(axisEdit, input);
  const columns = axisColumns(values);
  return taken(`This machine already has an axis ${values.tag}.`, 'tag', () =>
    withScope(scope, async (tx) => {
      const before = await editAxis(tx, scope, id, rowVersion, columns);
      const kept = Object.fromEntries(
        Object.keys(columns).map((key) => [key, before[key as keyof typeof before]]),
      );
      await emitAudit(tx, permitted, {
        action: 'edit',
        subjectKind: 'axis',
        subjectId: before.id,
        detail: { changes: diffValues(kept, columns) },
      });
      return { id: before.id };
    }),
  );
}
