import { and, eq } from 'drizzle-orm';
import { axes } from '../../../db/schema';
import { withScope } from '../../../db/tx';
import { emitAudit } from '../../audit/emit';
import { authorise } from '../../auth/permissions';
import type { Scope } from '../../auth/scope';
import { diffValues } from '../../change';
import { FettleError, notFound } from '../../errors';
import { asId } from '../../ids';
import { axisEdit } from '../../schemas/axis';
import { parseInput } from '../parse-input';
import { taken } from '../unique-name';
import { axisColumns } from './create-axis';

/** @throws FettleError FORBIDDEN, MALFORMED, NOT_FOUND, or CONFLICT when someone else edited it meanwhile */
export async function updateAxis(scope: Scope, id: string, input: unknown): Promise<{ id: string }> {
  authorise(scope, 'machine.edit');
  const { rowVersion, ...values } = parseInput(axisEdit, input);
  const columns = axisColumns(values);
  return taken(`This machine already has an axis ${values.tag}.`, 'tag', () =>
    withScope(scope, async (tx) => {
      const own = and(eq(axes.orgId, scope.orgId), eq(axes.id, asId(id, 'axis')));
      const [before] = await tx.select().from(axes).where(own);
      if (!before) throw notFound('axis');
      const changed = await tx
        .update(axes)
        .set({ ...columns, rowVersion: rowVersion + 1 })
        .where(and(own, eq(axes.rowVersion, rowVersion)))
        .returning({ id: axes.id });
      if (changed.length === 0)
        throw new FettleError(
          'CONFLICT',
          'Someone else edited this axis meanwhile. Load it again and repeat your edit.',
        );
      const kept = Object.fromEntries(
        Object.keys(columns).map((key) => [key, before[key as keyof typeof before]]),
      );
      await emitAudit(tx, scope, {
        action: 'edit',
        subjectKind: 'axis',
        subjectId: before.id,
        detail: { changes: diffValues(kept, columns) },
      });
      return { id: before.id };
    }),
  );
}
