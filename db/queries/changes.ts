import { and, asc, desc, eq, inArray } from 'drizzle-orm';
import { alias } from 'drizzle-orm/pg-core';
import type { Scope } from '../../lib/auth/scope';
import type { ChangeState } from '../../lib/change';
import type { Transaction } from '../client';
import { axes, changeEvents, changes, fieldReports, gainSets, machines, persons } from '../schema';
import { before } from './cursor';
import type { GainSetRecord } from './gain-sets';

const fromSet = alias(gainSets, 'from_set');
const toSet = alias(gainSets, 'to_set');

export interface ChangeLine {
  readonly id: string;
  readonly number: number;
  readonly state: ChangeState;
  readonly axisId: string;
  readonly tag: string;
  readonly axisName: string;
  readonly fromVersion: number | null;
  readonly toVersion: number;
  readonly reason: string;
  readonly authorId: string;
  readonly authorName: string;
  readonly technicianId: string | null;
  readonly changedAt: Date;
}

/** Changes, newest first; `after` is the last number of the page before. */
export async function listChanges(
  tx: Transaction,
  scope: Scope,
  params: { limit: number; after?: number; states?: readonly ChangeState[]; axisId?: string },
): Promise<ChangeLine[]> {
  const { after, states, axisId, limit } = params;
  return tx
    .select({
      id: changes.id,
      number: changes.number,
      state: changes.state,
      axisId: changes.axisId,
      tag: axes.tag,
      axisName: axes.name,
      fromVersion: fromSet.version,
      toVersion: toSet.version,
      reason: changes.reason,
      authorId: changes.authorId,
      authorName: changes.authorName,
      technicianId: changes.technicianId,
      changedAt: changes.changedAt,
    })
    .from(changes)
    .innerJoin(axes, and(eq(axes.orgId, changes.orgId), eq(axes.id, changes.axisId)))
    .innerJoin(toSet, and(eq(toSet.orgId, changes.orgId), eq(toSet.id, changes.toGainSetId)))
    .leftJoin(fromSet, and(eq(fromSet.orgId, changes.orgId), eq(fromSet.id, changes.fromGainSetId)))
    .where(
      and(
        eq(changes.orgId, scope.orgId),
        before(changes.number, after),
        states ? inArray(changes.state, [...states]) : undefined,
        axisId ? eq(changes.axisId, axisId) : undefined,
      ),
    )
    .orderBy(desc(changes.number))
    .limit(limit);
}

export interface ChangeRecord {
  readonly change: typeof changes.$inferSelect;
  readonly axis: typeof axes.$inferSelect;
  readonly machine: typeof machines.$inferSelect;
  readonly from: GainSetRecord | null;
  readonly to: GainSetRecord;
  readonly technicianName: string | null;
  readonly events: readonly (typeof changeEvents.$inferSelect)[];
  readonly reports: readonly (typeof fieldReports.$inferSelect)[];
}

/** One change with all that its record says; null when there is none in the scope. */
export async function getChange(
  tx: Transaction,
  scope: Scope,
  params: { id: string },
): Promise<ChangeRecord | null> {
  const [row] = await tx
    .select({
      change: changes,
      axis: axes,
      machine: machines,
      from: fromSet,
      to: toSet,
      technicianName: persons.name,
    })
    .from(changes)
    .innerJoin(axes, and(eq(axes.orgId, changes.orgId), eq(axes.id, changes.axisId)))
    .innerJoin(machines, and(eq(machines.orgId, axes.orgId), eq(machines.id, axes.machineId)))
    .innerJoin(toSet, and(eq(toSet.orgId, changes.orgId), eq(toSet.id, changes.toGainSetId)))
    .leftJoin(fromSet, and(eq(fromSet.orgId, changes.orgId), eq(fromSet.id, changes.fromGainSetId)))
    .leftJoin(persons, eq(persons.id, changes.technicianId))
    .where(and(eq(changes.orgId, scope.orgId), eq(changes.id, params.id)));
  if (!row) return null;
  const events = await tx
    .select()
    .from(changeEvents)
    .where(and(eq(changeEvents.orgId, scope.orgId), eq(changeEvents.changeId, params.id)))
    .orderBy(asc(changeEvents.seq));
  const reports = await tx
    .select()
    .from(fieldReports)
    .where(and(eq(fieldReports.orgId, scope.orgId), eq(fieldReports.changeId, params.id)))
    .orderBy(asc(fieldReports.receivedAt));
  const { change, axis, machine, from, to, technicianName } = row;
  return { change, axis, machine, from, to, technicianName, events, reports };
}
