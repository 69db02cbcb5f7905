import { and, eq } from 'drizzle-orm';
import { machines } from '../../../db/schema';
import { withScope } from '../../../db/tx';
import { emitAudit } from '../../audit/emit';
import { authorise } from '../../auth/permissions';
import type { Scope } from '../../auth/scope';
import { FettleError, notFound } from '../../errors';
import { asId } from '../../ids';
import { machineEdit } from '../../schemas/machine';
import { parseInput } from '../parse-input';
import { taken } from '../unique-name';

/** @throws FettleError FORBIDDEN, MALFORMED, NOT_FOUND, or CONFLICT when someone else edited it meanwhile */
export async function updateMachine(scope: Scope, id: string, input: unknown): Promise<{ id: string }> {
  const permitted = authorise(scope, 'machine.edit');
  const { rowVersion, ...values } = parseInput(machineEdit, input);
  return taken(`There is already a machine “${values.name}” at ${values.site}.`, 'name', () =>
    withScope(scope, async (tx) => {
      const own = and(eq(machines.orgId, scope.orgId), eq(machines.id, asId(id, 'machine')));
      const [before] = await tx.select().from(machines).where(own);
      if (!before) throw notFound('machine');
      const changed = await tx
        .update(machines)
        .set({ ...values, rowVersion: rowVersion + 1 })
        .where(and(own, eq(machines.rowVersion, rowVersion)))
        .returning({ id: machines.id });
      if (changed.length === 0)
        throw new FettleError(
          'CONFLICT',
          'Someone else edited this machine meanwhile. Load it again and repeat your edit.',
        );
      const { site, name, cautions } = before;
      await emitAudit(tx, permitted, {
        action: 'edit',
        subjectKind: 'machine',
        subjectId: id,
        detail: { before: { site, name, cautions }, after: values },
      });
      return { id };
    }),
  );
}
