import { and, desc, eq } from 'drizzle-orm';
import type { Transaction } from '../../../db/client';
import { changeEvents, changes, persons } from '../../../db/schema';
import { withScope, withSystem } from '../../../db/tx';
import { eventContent } from '../../audit/change-chain';
import { emitAudit } from '../../audit/emit';
import { chainHash } from '../../audit/hash';
import { passwordMatches } from '../../auth/passwords';
import { authorise } from '../../auth/permissions';
import { personOf, type Scope } from '../../auth/scope';
import { CHANGE_STEPS, permittedStep, signatureMeaning, type ChangeAction } from '../../change';
import { FettleError } from '../../errors';
import { changeName, loadAxis, loadChange, type AxisRow, type ChangeRow } from './content';
import { writeLetters } from './letters';

export interface StepContext {
  readonly tx: Transaction;
  readonly change: ChangeRow;
  readonly axis: AxisRow;
}

export interface StepRequest {
  readonly action: ChangeAction;
  readonly remark?: string;
  readonly payload?: Record<string, unknown>;
  /** Verification only. */
  readonly result?: 'pass' | 'fail';
  /** Columns of the change that the step sets beside its state. */
  readonly set?: Partial<Pick<ChangeRow, 'technicianId'>>;
  /** What else the step needs and does, in its transaction; throws to refuse. */
  readonly also?: (context: StepContext) => Promise<void>;
  /** Asks again who signs, before anything is written; throws to refuse. */
  readonly confirm?: () => Promise<void>;
}

/** The password asked for again under a signature. */
export async function confirmPassword(scope: Scope, password: string): Promise<void> {
  const { id } = personOf(scope);
  const [row] = await withSystem((tx) =>
    tx.select({ passwordHash: persons.passwordHash }).from(persons).where(eq(persons.id, id)),
  );
  if (await passwordMatches(password, row?.passwordHash ?? null)) return;
  const message = 'That is not your password. Nothing was signed.';
  throw new FettleError('FORBIDDEN', message, { fields: [{ path: 'password', message }] });
}

export async function appendEvent(
  tx: Transaction,
  scope: Scope,
  change: ChangeRow,
  event: {
    action: ChangeAction | 'draft';
    role: string;
    meaning: string | null;
    remark: string;
    payload: Record<string, unknown>;
  },
): Promise<void> {
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
}

async function stepIn(tx: Transaction, scope: Scope, id: string, request: StepRequest): Promise<void> {
  const change = await loadChange(tx, scope, id);
  const { action, remark = '', payload = {}, result } = request;
  const { roles, onePersonShop } = scope.actor;
  const isAuthor = change.authorId === scope.actor.id;
  const step = permittedStep({ state: change.state, action, roles, isAuthor, onePersonShop, result });
  if (!step.ok) throw new FettleError(step.code === 'WRONG_STATE' ? 'CONFLICT' : 'FORBIDDEN', step.message);
  const axis = await loadAxis(tx, scope, change.axisId);
  const moved = await tx
    .update(changes)
    .set({ state: step.value.to, rowVersion: change.rowVersion + 1, changedAt: new Date(), ...request.set })
    .where(
      and(
        eq(changes.orgId, scope.orgId),
        eq(changes.id, change.id),
        eq(changes.state, change.state),
        eq(changes.rowVersion, change.rowVersion),
      ),
    )
    .returning();
  if (moved.length === 0)
    throw new FettleError(
      'CONFLICT',
      'Someone else acted on this change at the same moment. Load it again to see what was done.',
    );
  await request.also?.({ tx, change, axis });
  const permitted = CHANGE_STEPS[action].roles;
  const role = roles.find((one) => permitted.includes(one)) ?? 'author';
  const shop = onePersonShop && isAuthor && action === 'approve' ? { onePersonShop: true } : {};
  await appendEvent(tx, scope, change, {
    action,
    role,
    meaning: signatureMeaning(action),
    remark,
    payload: { ...payload, ...shop, from: change.state, to: step.value.to },
  });
  await writeLetters(tx, scope, action, moved[0], axis, remark);
  await emitAudit(tx, scope, {
    action: `change.${action}`,
    subjectKind: 'change',
    subjectId: change.id,
    detail: {
      number: changeName(change.number),
      from: change.state,
      to: step.value.to,
      ...(remark ? { remark } : {}),
    },
  });
}

/** A refused attempt is itself a fact: it goes to the audit log, and nothing else is written. */
async function recordRefusal(
  scope: Scope,
  id: string,
  action: ChangeAction,
  error: FettleError,
): Promise<void> {
  await withScope(scope, async (tx) => {
    const change = await loadChange(tx, scope, id);
    await emitAudit(tx, scope, {
      action: `change.${action}.refused`,
      subjectKind: 'change',
      subjectId: change.id,
      detail: { number: changeName(change.number), state: change.state, because: error.message },
    });
  });
}

/**
 * Takes one step of a change: who may, in which state, by compare-and-set, with its event, its letters and its audit
 * line in one transaction.
 *
 * @throws FettleError NOT_FOUND; FORBIDDEN by role or four eyes; CONFLICT by state or when another was faster
 */
export async function takeStep(scope: Scope, id: string, request: StepRequest): Promise<void> {
  try {
    authorise(scope, 'change.step');
    await request.confirm?.();
    await withScope(scope, (tx) => stepIn(tx, scope, id, request));
  } catch (error) {
    if (error instanceof FettleError && error.code !== 'NOT_FOUND')
      await recordRefusal(scope, id, request.action, error);
    throw error;
  }
}
