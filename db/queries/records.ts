import { and, desc, eq, getTableColumns, sql } from 'drizzle-orm';
import type { Scope } from '../../lib/auth/scope';
import type { Transaction } from '../client';
import { auditEvents, inboxMessages, outboxMessages } from '../schema';
import { before } from './cursor';

export type AuditLine = Omit<typeof auditEvents.$inferSelect, 'orgId'>;

const { orgId: _auditOrg, ...auditColumns } = getTableColumns(auditEvents);
const { orgId: _inboxOrg, ...inboxColumns } = getTableColumns(inboxMessages);

/** The audit log, newest first; `after` is the last number of the page before. */
export async function listAuditEvents(
  tx: Transaction,
  scope: Scope,
  params: { limit: number; after?: number },
): Promise<AuditLine[]> {
  return tx
    .select(auditColumns)
    .from(auditEvents)
    .where(and(eq(auditEvents.orgId, scope.orgId), before(auditEvents.seq, params.after)))
    .orderBy(desc(auditEvents.seq))
    .limit(params.limit);
}

export type InboxLine = Omit<typeof inboxMessages.$inferSelect, 'orgId'>;

export async function listInbox(
  tx: Transaction,
  scope: Scope,
  params: { limit: number },
): Promise<InboxLine[]> {
  return tx
    .select(inboxColumns)
    .from(inboxMessages)
    .where(eq(inboxMessages.orgId, scope.orgId))
    .orderBy(desc(inboxMessages.receivedAt))
    .limit(params.limit);
}

/** How many letters still wait to be sent. */
export async function countWaitingLetters(tx: Transaction, scope: Scope): Promise<number> {
  const [row] = await tx
    .select({ waiting: sql<number>`count(*)::int` })
    .from(outboxMessages)
    .where(and(eq(outboxMessages.orgId, scope.orgId), sql`${outboxMessages.sentAt} is null`));
  return row.waiting;
}
