import { and, eq } from 'drizzle-orm';
import { axes, fieldReports, type Values } from '../../../db/schema';
import { personOf, type Scope } from '../../auth/scope';
import { FettleError } from '../../errors';
import { rollBackInput } from '../../schemas/change';
import { parseInput } from '../parse-input';
import { loadGainSet } from './content';
import { differences, requireEveryValue } from './device-values';
import { takeStep, type StepContext } from './take-step';

/** The axis goes back to the version before, if this change had moved it and no later one has since. */
async function moveBack({ tx, change, axis }: StepContext, scope: Scope): Promise<void> {
  if (change.state === 'issued') return;
  if (axis.inServiceGainSetId !== change.toGainSetId)
    throw new FettleError(
      'CONFLICT',
      `A later change has moved ${axis.tag} since; roll that one back first.`,
    );
  await tx
    .update(axes)
    .set({ inServiceGainSetId: change.fromGainSetId, inServiceSince: new Date() })
    .where(and(eq(axes.orgId, scope.orgId), eq(axes.id, axis.id)));
}

/** Going back is never refused for its values; what is not as before is told in the record. */
async function judgeAsLeft({ tx, change }: StepContext, scope: Scope, asLeft: Values): Promise<string[]> {
  if (!change.fromGainSetId) return [];
  const { deviceRows } = await loadGainSet(tx, scope, change.fromGainSetId);
  const known = deviceRows.filter(({ name }) => asLeft[name] !== undefined);
  return differences(asLeft, known, 'asLeft').map(({ message }) => message);
}

/** Records that the earlier values are back at the machine. */
export async function rollBackChange(scope: Scope, id: string, input: unknown): Promise<void> {
  const { reason, asLeft, enteredAt } = parseInput(rollBackInput, input);
  const person = personOf(scope);
  const payload: Record<string, unknown> = { asLeft };
  await takeStep(scope, id, {
    action: 'roll-back',
    remark: reason,
    payload,
    also: async (context) => {
      const { tx, change } = context;
      const to = await loadGainSet(tx, scope, change.toGainSetId);
      requireEveryValue(asLeft, to.deviceRows, 'asLeft', 'as left');
      payload.asLeftDifferences = await judgeAsLeft(context, scope, asLeft);
      await tx.insert(fieldReports).values({
        orgId: scope.orgId,
        changeId: change.id,
        kind: 'roll-back',
        asLeft,
        remark: reason,
        enteredAt: enteredAt ? new Date(enteredAt) : null,
        enteredBy: person.id,
        enteredByName: person.name,
      });
      await moveBack(context, scope);
    },
  });
}
