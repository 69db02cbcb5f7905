import { and, eq } from 'drizzle-orm';
import type { Transaction } from '../../../db/client';
import { axes, changes, gainSets } from '../../../db/schema';
import type { Scope } from '../../auth/scope';
import { FettleError, notFound } from '../../errors';
import { asId } from '../../ids';

export type ChangeRow = typeof changes.$inferSelect;
export type AxisRow = typeof axes.$inferSelect;
export type GainSetRow = typeof gainSets.$inferSelect;

export async function loadChange(tx: Transaction, scope: Scope, id: string): Promise<ChangeRow> {
  const [row] = await tx
    .select()
    .from(changes)
    .where(and(eq(changes.orgId, scope.orgId), eq(changes.id, asId(id, 'change'))));
  if (!row) throw notFound('change');
  return row;
}

export async function loadAxis(tx: Transaction, scope: Scope, id: string): Promise<AxisRow> {
  const [row] = await tx
    .select()
    .from(axes)
    .where(and(eq(axes.orgId, scope.orgId), eq(axes.id, asId(id, 'axis'))));
  if (!row) throw notFound('axis');
  return row;
}

export async function loadGainSet(tx: Transaction, scope: Scope, id: string): Promise<GainSetRow> {
  const [row] = await tx
    .select()
    .from(gainSets)
    .where(and(eq(gainSets.orgId, scope.orgId), eq(gainSets.id, asId(id, 'version'))));
  if (!row) throw notFound('version');
  return row;
}

/** Until when a temporary change holds; an end that is over would be no change at all. */
export function endOfTemporary(until: string | undefined): Date | null {
  if (until === undefined) return null;
  const end = new Date(until);
  if (end.getTime() > Date.now()) return end;
  const message = 'A temporary change ends in the future; give a later time.';
  throw new FettleError('INVALID', message, { fields: [{ path: 'temporaryUntil', message }] });
}

export function changeName(number: number): string {
  return `C-${String(number).padStart(4, '0')}`;
}
