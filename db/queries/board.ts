import { and, desc, eq } from 'drizzle-orm';
import type { Scope } from '../../lib/auth/scope';
import type { Transaction } from '../client';
import { axes, changeEvents, changes } from '../schema';

export interface RecentEvent {
  readonly changeId: string;
  readonly seq: number;
  readonly number: number;
  readonly tag: string;
  readonly action: string;
  readonly byName: string;
  readonly remark: string;
  readonly at: Date;
}

/** The latest steps of all changes, newest first. */
export async function listRecentEvents(
  tx: Transaction,
  scope: Scope,
  params: { limit: number },
): Promise<RecentEvent[]> {
  return tx
    .select({
      changeId: changeEvents.changeId,
      seq: changeEvents.seq,
      number: changes.number,
      tag: axes.tag,
      action: changeEvents.action,
      byName: changeEvents.byName,
      remark: changeEvents.remark,
      at: changeEvents.at,
    })
    .from(changeEvents)
    .innerJoin(changes, and(eq(changes.orgId, changeEvents.orgId), eq(changes.id, changeEvents.changeId)))
    .innerJoin(axes, and(eq(axes.orgId, changes.orgId), eq(axes.id, changes.axisId)))
    .where(eq(changeEvents.orgId, scope.orgId))
    .orderBy(desc(changeEvents.at), desc(changeEvents.seq))
    .limit(params.limit);
}
