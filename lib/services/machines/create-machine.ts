import { machines } from '../../../db/schema';
import { withScope } from '../../../db/tx';
import { emitAudit } from '../../audit/emit';
import { authorise } from '../../auth/permissions';
import type { Scope } from '../../auth/scope';
import { machineInput } from '../../schemas/machine';
import { parseInput } from '../parse-input';
import { taken } from '../unique-name';

/** @throws FettleError FORBIDDEN, MALFORMED, or CONFLICT when the site has a machine of that name */
export async function createMachine(scope: Scope, input: unknown): Promise<{ id: string }> {
  const permitted = authorise(scope, 'machine.edit');
  const values = parseInput(machineInput, input);
  return taken(`There is already a machine “${values.name}” at ${values.site}.`, 'name', () =>
    withScope(scope, async (tx) => {
      const [row] = await tx
        .insert(machines)
        .values({ orgId: scope.orgId, ...values })
        .returning({ id: machines.id });
      await emitAudit(tx, permitted, {
        action: 'create',
        subjectKind: 'machine',
        subjectId: row.id,
        detail: { after: values },
      });
      return row;
    }),
  );
}
