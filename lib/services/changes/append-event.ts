import { and, desc, eq } from 'drizzle-orm';
import type { Transaction } from '../../../db/client';
import { changeEvents } from '../../../db/schema';
import { eventContent } from '../../audit/change-chain';
import { chainHash } from '../../audit/hash';
import { personOf, type Scope } from '../../auth/scope';
import type { ChangeAction } from '../../change';
import type { ChangeRow } from './content';

export interface StepEvent {
  readonly action: ChangeAction | 'draft';
  readonly role: string;
  /** What the signature under the step means; null where nothing is signed. */
  readonly meaning: string | null;
  readonly remark: string;
  readonly payload: Record<string, unknown>;
}

/**
 * Appends one event to the chain of a change, in the transaction of its step.
 *
 * @returns the hash of the event; the audit line of the step carries it, which binds the two chains
 */
export async function appendEvent(
  tx: Transaction,
  scope: Scope,
  change: ChangeRow,
  event: StepEvent,
): Promise<string> {
  const { id, name } = personOf(scope);
  const [last] = await tx
    .select({ seq: changeEvents.seq, hash: changeEvents.hash })
    .from(changeEvents)
    .where(and(eq(changeEvents.orgId, scope.orgId), eq(changeEvents.changeId, change.id)))
    .orderBy(desc(changeEvents.seq))
    .limit(1);
  const row = {
    changeId: change.id,
    seq: (last?.seq ?? 0) + 1,
    action: event.action,
    byId: id,
    byName: name,
    byRole: event.role,
    at: new Date(),
    meaning: event.meaning,
    remark: event.remark,
    payload: event.payload,
    contentHash: change.contentHash,
  };
  const previousHash = last?.hash ?? '';
  const hash = chainHash(previousHash, eventContent(row));
  await tx.insert(changeEvents).values({ orgId: scope.orgId, ...row, previousHash, hash });
  return hash;
}
