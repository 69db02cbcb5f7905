import { and, eq } from 'drizzle-orm';
import type { Transaction } from '../../../db/client';
import { axes } from '../../../db/schema';
import type { Scope } from '../../auth/scope';
import { FettleError, notFound } from '../../errors';
import { asId } from '../../ids';

export type AxisRow = typeof axes.$inferSelect;

/**
 * Sets columns of an axis if nobody edited it since the version that the edit started from.
 *
 * @returns the row as it was before
 * @throws FettleError NOT_FOUND or CONFLICT
 */
export async function editAxis(
  tx: Transaction,
  scope: Scope,
  id: string,
  rowVersion: number,
  columns: Partial<AxisRow>,
): Promise<AxisRow> {
  const own = and(eq(axes.orgId, scope.orgId), eq(axes.id, asId(id, 'axis')));
  const [before] = await tx.select().from(axes).where(own);
  if (!before) throw notFound('axis');
  const changed = await tx
    .update(axes)
    .set({ ...columns, rowVersion: rowVersion + 1 })
    .where(and(own, eq(axes.rowVersion, rowVersion)))
    .returning({ id: axes.id });
  if (changed.length > 0) return before;
  throw new FettleError(
    'CONFLICT',
    'Someone else edited this axis meanwhile. Load it again and repeat your edit.',
  );
}
