import { and, asc, eq, getTableColumns, gt, lte } from 'drizzle-orm';
import { alias } from 'drizzle-orm/pg-core';
import type { Transaction } from '../../db/client';
import { auditEvents, axes, changeEvents, changes, counters, gainSets } from '../../db/schema';
import type { Scope } from '../auth/scope';
import { eventContent } from './change-chain';
import { contentHash, gainSetDigest } from './digest';
import { auditContent } from './emit';
import { walkChain, type ChainReport } from './walk';

export type { ChainReport } from './walk';

const BATCH = 1000;

/** Follows the organisation's audit chain from its start to the end that its counter names. */
export async function verifyAudit(tx: Transaction, scope: Scope): Promise<ChainReport> {
  const [end] = await tx
    .select({ seq: counters.auditSeq, hash: counters.auditHash })
    .from(counters)
    .where(eq(counters.orgId, scope.orgId));
  const { orgId, seq } = auditEvents;
  const read = async (after: number) => {
    const rows = await tx
      .select()
      .from(auditEvents)
      .where(and(eq(orgId, scope.orgId), gt(seq, after), lte(seq, end.seq)))
      .orderBy(asc(seq))
      .limit(BATCH);
    return rows.map((row) => ({ ...row, content: auditContent(row) }));
  };
  return walkChain(read, end);
}

const fromSet = alias(gainSets, 'from_set');
const toSet = alias(gainSets, 'to_set');

async function loadSigned(tx: Transaction, scope: Scope, changeId: string) {
  const [row] = await tx
    .select({ ...getTableColumns(changes), fromDigest: fromSet.digest, toDigest: toSet.digest })
    .from(changes)
    .innerJoin(toSet, and(eq(toSet.orgId, changes.orgId), eq(toSet.id, changes.toGainSetId)))
    .leftJoin(fromSet, and(eq(fromSet.orgId, changes.orgId), eq(fromSet.id, changes.fromGainSetId)))
    .where(and(eq(changes.orgId, scope.orgId), eq(changes.id, changeId)));
  return row;
}

/** The same for the events of one change; and whether the change still says, and stands, as its last event has it. */
export async function verifyChangeEvents(
  tx: Transaction,
  scope: Scope,
  changeId: string,
): Promise<ChainReport> {
  const rows = await tx
    .select()
    .from(changeEvents)
    .where(and(eq(changeEvents.orgId, scope.orgId), eq(changeEvents.changeId, changeId)))
    .orderBy(asc(changeEvents.seq));
  const links = rows.map((row) => ({ ...row, content: eventContent(row) }));
  const report = await walkChain(async (after) => links.slice(after), null);
  if (!report.intact) return report;
  const change = await loadSigned(tx, scope, changeId);
  const last = rows[rows.length - 1];
  const wrong = (because: string) => ({ ...report, intact: false, firstBroken: last.seq, because });
  const reached = last.action === 'draft' ? 'draft' : last.payload.to;
  if (change.state !== reached) return wrong('The change is in another state than its last event says.');
  const isEditable = change.state === 'draft' || change.state === 'returned';
  if (
    change.contentHash !== contentHash(change, change.fromDigest, change.toDigest) ||
    (!isEditable && change.contentHash !== last.contentHash)
  )
    return wrong('The content of the change is not what was signed.');
  return report;
}

/** Whether every version of an axis still says what it said when it was kept; their numbers run without a gap. */
export async function verifyVersions(tx: Transaction, scope: Scope, axisId: string): Promise<ChainReport> {
  const [axis] = await tx
    .select({ last: axes.lastVersion })
    .from(axes)
    .where(and(eq(axes.orgId, scope.orgId), eq(axes.id, axisId)));
  const rows = await tx
    .select()
    .from(gainSets)
    .where(and(eq(gainSets.orgId, scope.orgId), eq(gainSets.axisId, axisId)))
    .orderBy(asc(gainSets.version));
  const length = rows.length;
  const bad = rows.find((row, index) => row.version !== index + 1 || row.digest !== gainSetDigest(row));
  if (bad) return { intact: false, length, firstBroken: bad.version, because: 'It is not as it was kept.' };
  if (length < axis.last)
    return { intact: false, length, firstBroken: length + 1, because: 'It is missing.' };
  return { intact: true, length, firstBroken: null, because: null };
}
