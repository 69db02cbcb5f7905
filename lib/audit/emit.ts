import { eq, sql } from 'drizzle-orm';
import type { Transaction } from '../../db/client';
import { auditEvents, counters } from '../../db/schema';
import type { Permitted } from '../auth/permissions';
import type { Scope } from '../auth/scope';
import type { ChangeAction } from '../change';
import { chainHash } from './hash';

type Subject = 'machine' | 'axis' | 'gain-set' | 'change' | 'person' | 'token' | 'organisation';

/** All that the log can say was done; the words are stored, so none is ever renamed. */
type AuditAction =
  | 'create'
  | 'edit'
  | 'keep'
  | 'revoke'
  | 'set-up'
  | 'sign-in'
  | 'password'
  | `change.${ChangeAction | 'draft'}`;

export interface AuditEntry {
  readonly action: AuditAction;
  readonly subjectKind: Subject;
  readonly subjectId: string | null;
  readonly detail?: Record<string, unknown>;
}

/** The part of an audit row that its hash covers. */
export function auditContent(row: {
  seq: number;
  at: Date;
  actorKind: string;
  actorId: string | null;
  actorName: string;
  action: string;
  subjectKind: string;
  subjectId: string | null;
  detail: Record<string, unknown>;
}) {
  const { seq, actorKind, actorId, actorName, action, subjectKind, subjectId, detail } = row;
  return {
    seq,
    at: row.at.toISOString(),
    actorKind,
    actorId,
    actorName,
    action,
    subjectKind,
    subjectId,
    detail,
  };
}

/** The counter's row lock keeps the organisation's chain in one line. */
async function append(
  tx: Transaction,
  scope: Scope,
  entry: Omit<AuditEntry, 'action'> & { action: string },
): Promise<void> {
  const [end] = await tx
    .update(counters)
    .set({ auditSeq: sql`${counters.auditSeq} + 1` })
    .where(eq(counters.orgId, scope.orgId))
    .returning({ seq: counters.auditSeq, hash: counters.auditHash });
  const row = {
    seq: end.seq,
    at: new Date(),
    actorKind: scope.actor.kind,
    actorId: scope.actor.id,
    actorName: scope.actor.name,
    action: entry.action,
    subjectKind: entry.subjectKind,
    subjectId: entry.subjectId,
    detail: entry.detail ?? {},
  };
  const hash = chainHash(end.hash, auditContent(row));
  await tx.insert(auditEvents).values({ orgId: scope.orgId, ...row, previousHash: end.hash, hash });
  await tx.update(counters).set({ auditHash: hash }).where(eq(counters.orgId, scope.orgId));
}

/**
 * Appends one line to the organisation's audit chain, in the caller's transaction: what is not recorded does not
 * happen.
 */
export function emitAudit(tx: Transaction, permitted: Permitted, entry: AuditEntry): Promise<void> {
  return append(tx, permitted, entry);
}

/** The line of an attempt that was refused; it needs no right. */
export function emitRefusal(tx: Transaction, scope: Scope, entry: AuditEntry): Promise<void> {
  return append(tx, scope, { ...entry, action: `${entry.action}.refused` });
}
