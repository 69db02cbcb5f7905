import { and, eq } from 'drizzle-orm';
import type { z } from 'zod';
import { axes, loadCases, machines } from '../../../db/schema';
import { withScope } from '../../../db/tx';
import { emitAudit } from '../../audit/emit';
import { authorise } from '../../auth/permissions';
import type { Scope } from '../../auth/scope';
import { notFound } from '../../errors';
import { axisInput, type axisEdit } from '../../schemas/axis';
import { parseInput } from '../parse-input';
import { taken } from '../unique-name';

/** An axis' columns from its form: a cleared field is null, not left as it was. */
export function axisColumns(values: Omit<z.output<typeof axisEdit>, 'rowVersion'>) {
  const { actuatorLow, actuatorHigh, actuatorSlew, sampleTimeS, convention, ...rest } = values;
  return {
    ...rest,
    actuatorLow: actuatorLow ?? null,
    actuatorHigh: actuatorHigh ?? null,
    actuatorSlew: actuatorSlew ?? null,
    sampleTimeS: sampleTimeS ?? null,
    convention: { ...convention, ...(sampleTimeS === undefined ? {} : { sampleTimeS }) },
  };
}

/** Adds an axis with its first load case, "nominal". @throws FettleError FORBIDDEN, MALFORMED, NOT_FOUND, CONFLICT */
export async function createAxis(scope: Scope, input: unknown): Promise<{ id: string }> {
  const permitted = authorise(scope, 'machine.edit');
  const { machineId, ...values } = parseInput(axisInput, input);
  const columns = axisColumns(values);
  return taken(`This machine already has an axis ${values.tag}.`, 'tag', () =>
    withScope(scope, async (tx) => {
      const [machine] = await tx
        .select({ id: machines.id })
        .from(machines)
        .where(and(eq(machines.orgId, scope.orgId), eq(machines.id, machineId)));
      if (!machine) throw notFound('machine');
      const [row] = await tx
        .insert(axes)
        .values({ orgId: scope.orgId, machineId, ...columns, requirement: {} })
        .returning({ id: axes.id });
      await tx.insert(loadCases).values({ orgId: scope.orgId, axisId: row.id, name: 'nominal', position: 0 });
      await emitAudit(tx, permitted, {
        action: 'create',
        subjectKind: 'axis',
        subjectId: row.id,
        detail: { after: columns },
      });
      return row;
    }),
  );
}
