import { and, eq, isNull } from 'drizzle-orm';
import { axes, fieldReports } from '../../../db/schema';
import { personOf, type Scope } from '../../auth/scope';
import { FettleError } from '../../errors';
import { applyInput, type ApplyInput } from '../../schemas/change';
import { parseInput } from '../parse-input';
import { requireBaseline } from './baseline';
import { loadGainSet } from './content';
import { differences, requireEveryValue } from './device-values';
import { takeStep, type StepContext } from './take-step';

/** As-found is laid against what is believed to be in service; a difference needs a word from whoever was asked. */
async function judgeAsFound(context: StepContext, scope: Scope, input: ApplyInput): Promise<string[]> {
  const { tx, change } = context;
  const to = await loadGainSet(tx, scope, change.toGainSetId);
  const from = change.fromGainSetId ? await loadGainSet(tx, scope, change.fromGainSetId) : null;
  requireEveryValue(input.asFound, from?.deviceRows ?? to.deviceRows, 'asFound', 'as found');
  requireEveryValue(input.asLeft, to.deviceRows, 'asLeft', 'as left');
  const left = differences(input.asLeft, to.deviceRows, 'asLeft');
  if (left.length > 0)
    throw new FettleError('INVALID', `As-left is not what was approved. ${left[0].message}`, {
      fields: left,
    });
  const found = from ? differences(input.asFound, from.deviceRows, 'asFound') : [];
  if (found.length > 0 && !input.asFoundRemark)
    throw new FettleError(
      'INVALID',
      `As-found is not what should be in service. ${found[0].message} Stop, ask the engineer, and write down what was said.`,
      {
        fields: [...found, { path: 'asFoundRemark', message: 'Write down who was asked and what was said.' }],
      },
    );
  return found.map(({ message }) => message);
}

/** A change issued to one technician is for that one alone. */
function requireNamedTechnician({ change }: StepContext, scope: Scope): void {
  if (change.technicianId === null || change.technicianId === scope.actor.id) return;
  throw new FettleError('FORBIDDEN', 'This change is issued to another technician.');
}

async function moveInService({ tx, change }: StepContext, scope: Scope): Promise<void> {
  const from = change.fromGainSetId;
  const moved = await tx
    .update(axes)
    .set({ inServiceGainSetId: change.toGainSetId, inServiceSince: new Date() })
    .where(
      and(
        eq(axes.orgId, scope.orgId),
        eq(axes.id, change.axisId),
        from === null ? isNull(axes.inServiceGainSetId) : eq(axes.inServiceGainSetId, from),
      ),
    )
    .returning({ id: axes.id });
  if (moved.length === 0)
    throw new FettleError('CONFLICT', 'Another change moved this axis at the same moment.');
}

/** Records what a technician found and left at the machine, and moves the version in service of the axis. */
export async function applyChange(scope: Scope, id: string, input: unknown): Promise<void> {
  const parsed = parseInput(applyInput, input);
  const person = personOf(scope);
  const payload: Record<string, unknown> = { ...parsed };
  await takeStep(scope, id, {
    action: 'apply',
    remark: parsed.remark,
    payload,
    also: async (context) => {
      requireNamedTechnician(context, scope);
      requireBaseline(context);
      payload.asFoundDifferences = await judgeAsFound(context, scope, parsed);
      await context.tx.insert(fieldReports).values({
        orgId: scope.orgId,
        changeId: context.change.id,
        kind: 'apply',
        identity: parsed.identity,
        asFound: parsed.asFound,
        asLeft: parsed.asLeft,
        saved: parsed.saved,
        enteredAt: parsed.enteredAt ? new Date(parsed.enteredAt) : null,
        remark: [parsed.asFoundRemark, parsed.remark].filter(Boolean).join('\n'),
        enteredBy: person.id,
        enteredByName: person.name,
      });
      await moveInService(context, scope);
    },
  });
}
