import type { Scope } from '../../auth/scope';
import { remarkInput } from '../../schemas/change';
import { parseInput } from '../parse-input';
import { takeStep } from './take-step';

/** Gives a submitted change back to its author, with a remark. */
export async function returnChange(scope: Scope, id: string, input: unknown): Promise<void> {
  const { remark } = parseInput(remarkInput, input);
  await takeStep(scope, id, { action: 'return', remark });
}
