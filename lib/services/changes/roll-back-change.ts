import { and, eq } from 'drizzle-orm';
import { axes, fieldReports } from '../../../db/schema';
import { personOf, type Scope } from '../../auth/scope';
import { FettleError } from '../../errors';
import { rollBackInput } from '../../schemas/change';
import { parseInput } from '../parse-input';
import { loadGainSet } from './content';
import { requireEveryValue } from './device-values';
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

/** Records that the earlier values are back at the machine. */
export async function rollBackChange(scope: Scope, id: string, input: unknown): Promise<void> {
  const { reason, asLeft } = parseInput(rollBackInput, input);
  const person = personOf(scope);
  await takeStep(scope, id, {
    action: 'roll-back',
    remark: reason,
    payload: { asLeft },
    also: async (context) => {
      const { tx, change } = context;
      const to = await loadGainSet(tx, scope, change.toGainSetId);
      requireEveryValue(asLeft, to.deviceRows, 'asLeft', 'as left');
      await tx.insert(fieldReports).values({
        orgId: scope.orgId,
        changeId: change.id,
        kind: 'roll-back',
        asLeft,
        remark: reason,
        enteredBy: person.id,
        enteredByName: person.name,
      });
      await moveBack(context, scope);
    },
  });
}
