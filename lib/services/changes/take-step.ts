import { and, eq } from 'drizzle-orm';
import type { Transaction } from '../../../db/client';
import { changes } from '../../../db/schema';
import { withScope } from '../../../db/tx';
import { emitAudit, emitRefusal } from '../../audit/emit';
import { authorise, type Permitted } from '../../auth/permissions';
import type { Scope } from '../../auth/scope';
import {
  CHANGE_STEPS,
  permittedStep,
  signatureMeaning,
  type ChangeAction,
  type PermittedStep,
} from '../../change';
import { FettleError } from '../../errors';
import { appendEvent } from './append-event';
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
  /** Asks again who signs, once it is clear that the person may; throws to refuse. */
  readonly confirm?: () => Promise<void>;
}

/** Whether the person may take the step, and where it leads; throws the reason why not. */
export function judgeStep(
  scope: Scope,
  change: ChangeRow,
  { action, result }: Pick<StepRequest, 'action' | 'result'>,
): PermittedStep {
  const { roles, onePersonShop } = scope.actor;
  const isAuthor = change.authorId === scope.actor.id;
  const step = permittedStep({ state: change.state, action, roles, isAuthor, onePersonShop, result });
  if (step.ok) return step.value;
  throw new FettleError(step.code === 'WRONG_STATE' ? 'CONFLICT' : 'FORBIDDEN', step.message);
}

/** The first of the person's roles that permits the step: the one it is signed in. */
function roleOf(scope: Scope, action: ChangeAction): string {
  const permitted = CHANGE_STEPS[action].roles;
  return scope.actor.roles.find((role) => permitted.includes(role)) ?? 'author';
}

async function move(tx: Transaction, scope: Scope, change: ChangeRow, set: Partial<ChangeRow>) {
  const moved = await tx
    .update(changes)
    .set({ ...set, rowVersion: change.rowVersion + 1, changedAt: new Date() })
    .where(
      and(
        eq(changes.orgId, scope.orgId),
        eq(changes.id, change.id),
        eq(changes.state, change.state),
        eq(changes.rowVersion, change.rowVersion),
      ),
    )
    .returning();
  if (moved.length > 0) return moved[0];
  throw new FettleError(
    'CONFLICT',
    'Someone else acted on this change at the same moment. Load it again to see what was done.',
  );
}

async function stepIn(tx: Transaction, permitted: Permitted, id: string, request: StepRequest) {
  const { action, remark = '', payload = {} } = request;
  const change = await loadChange(tx, permitted, id);
  const { to } = judgeStep(permitted, change, request);
  const axis = await loadAxis(tx, permitted, change.axisId);
  const moved = await move(tx, permitted, change, { state: to, ...request.set });
  await request.also?.({ tx, change, axis });
  const { id: actorId, onePersonShop } = permitted.actor;
  const isOwn = onePersonShop && change.authorId === actorId && action === 'approve';
  const event = await appendEvent(tx, permitted, change, {
    action,
    role: roleOf(permitted, action),
    meaning: signatureMeaning(action),
    remark,
    payload: { ...payload, ...(isOwn ? { onePersonShop } : {}), from: change.state, to },
  });
  await writeLetters(tx, permitted, action, moved, axis, remark);
  const number = changeName(change.number);
  await emitAudit(tx, permitted, {
    action: `change.${action}`,
    subjectKind: 'change',
    subjectId: change.id,
    detail: { number, from: change.state, to, event, ...(remark ? { remark } : {}) },
  });
}

/** A refused attempt is itself a fact: it goes to the audit log, and nothing else is written. */
export async function recordingRefusal<T>(
  scope: Scope,
  id: string,
  action: ChangeAction,
  work: () => Promise<T>,
): Promise<T> {
  try {
    return await work();
  } catch (error) {
    if (error instanceof FettleError && error.code !== 'NOT_FOUND')
      await withScope(scope, async (tx) => {
        const change = await loadChange(tx, scope, id);
        await emitRefusal(tx, scope, {
          action: `change.${action}`,
          subjectKind: 'change',
          subjectId: change.id,
          detail: { number: changeName(change.number), state: change.state, because: error.message },
        });
      });
    throw error;
  }
}

/**
 * Takes one step of a change: who may, in which state, by compare-and-set, with its event, its letters and its audit
 * line in one transaction.
 *
 * @throws FettleError NOT_FOUND; FORBIDDEN by role, four eyes or password; CONFLICT by state or when another was faster
 */
export function takeStep(scope: Scope, id: string, request: StepRequest): Promise<void> {
  return recordingRefusal(scope, id, request.action, async () => {
    const permitted = authorise(scope, 'change.step');
    if (request.confirm) {
      await withScope(scope, async (tx) => judgeStep(scope, await loadChange(tx, scope, id), request));
      await request.confirm();
    }
    await withScope(scope, (tx) => stepIn(tx, permitted, id, request));
  });
}
