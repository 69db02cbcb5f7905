import { and, asc, eq } from 'drizzle-orm';
import type { Transaction } from '../../db/client';
import { auditEvents, changeEvents } from '../../db/schema';
import type { Scope } from '../auth/scope';
import { eventContent } from './change-chain';
import { auditContent } from './emit';
import { chainHash } from './hash';

export interface ChainReport {
  readonly intact: boolean;
  readonly length: number;
  /** Number of the first row that does not follow from those before it. */
  readonly firstBroken: number | null;
}

interface Link {
  readonly seq: number;
  readonly previousHash: string;
  readonly hash: string;
  readonly content: unknown;
}

function checkChain(links: readonly Link[]): ChainReport {
  let previous = '';
  for (const [index, link] of links.entries()) {
    const whole =
      link.seq === index + 1 &&
      link.previousHash === previous &&
      link.hash === chainHash(previous, link.content);
    if (!whole) return { intact: false, length: links.length, firstBroken: link.seq };
    previous = link.hash;
  }
  return { intact: true, length: links.length, firstBroken: null };
}

/** Follows the organisation's audit chain from its start and names the first row that is not as it was written. */
export async function verifyAudit(tx: Transaction, scope: Scope): Promise<ChainReport> {
  const rows = await tx
    .select()
    .from(auditEvents)
    .where(eq(auditEvents.orgId, scope.orgId))
    .orderBy(asc(auditEvents.seq));
  return checkChain(rows.map((row) => ({ ...row, content: auditContent(row) })));
}

/** The same for the events of one change. */
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
  return checkChain(rows.map((row) => ({ ...row, content: eventContent(row) })));
}
