import type { Scope } from '../../auth/scope';
import { remarkInput } from '../../schemas/change';
import { parseInput } from '../parse-input';
import { takeStep } from './take-step';

/** The author takes a change back before it is issued. */
export async function withdrawChange(scope: Scope, id: string, input: unknown): Promise<void> {
  const { remark } = parseInput(remarkInput, input);
  await takeStep(scope, id, { action: 'withdraw', remark });
}
