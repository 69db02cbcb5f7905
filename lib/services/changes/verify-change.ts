import { fieldReports } from '../../../db/schema';
import { personOf, type Scope } from '../../auth/scope';
import { verifyInput } from '../../schemas/change';
import { parseInput } from '../parse-input';
import { takeStep } from './take-step';

/** Records the verification test; a failed one leaves the change applied and says that a roll-back is due. */
export async function verifyChange(scope: Scope, id: string, input: unknown): Promise<void> {
  const { result, remark = '', recordId } = parseInput(verifyInput, input);
  const person = personOf(scope);
  await takeStep(scope, id, {
    action: 'verify',
    result,
    remark,
    payload: { result, ...(recordId ? { recordId } : {}) },
    also: async ({ tx, change }) => {
      await tx.insert(fieldReports).values({
        orgId: scope.orgId,
        changeId: change.id,
        kind: 'verify',
        remark: [`result: ${result}`, remark].filter(Boolean).join('\n'),
        enteredBy: person.id,
        enteredByName: person.name,
      });
    },
  });
}
