import { and, eq } from 'drizzle-orm';
import type { Transaction } from '../../../db/client';
import { axes, changes, gainSets } from '../../../db/schema';
import type { Scope } from '../../auth/scope';
import { digestOf } from '../../audit/hash';
import { notFound } from '../../errors';
import { asId } from '../../ids';

export type ChangeRow = typeof changes.$inferSelect;
export type AxisRow = typeof axes.$inferSelect;
export type GainSetRow = typeof gainSets.$inferSelect;

/** What a signature under a change stands for: the versions by their digests, and every word of the record. */
export function contentHash(
  change: Pick<
    ChangeRow,
    | 'number'
    | 'axisId'
    | 'reason'
    | 'risk'
    | 'test'
    | 'wayBack'
    | 'temporaryUntil'
    | 'safetyFunction'
    | 'siteReference'
  >,
  fromDigest: string | null,
  toDigest: string,
): string {
  const { number, axisId, reason, risk, test, wayBack, temporaryUntil, safetyFunction, siteReference } =
    change;
  const until = temporaryUntil?.toISOString() ?? null;
  return digestOf({
    number,
    axisId,
    reason,
    risk,
    test,
    wayBack,
    temporaryUntil: until,
    safetyFunction,
    siteReference,
    from: fromDigest,
    to: toDigest,
  });
}

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

export function changeName(number: number): string {
  return `C-${String(number).padStart(4, '0')}`;
}
