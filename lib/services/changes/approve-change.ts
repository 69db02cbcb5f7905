import type { Scope } from '../../auth/scope';
import { approveInput } from '../../schemas/change';
import { parseInput } from '../parse-input';
import { requireBaseline } from './baseline';
import { confirmPassword, takeStep } from './take-step';

/** Signs a submitted change: another person than its author, with the password again. */
export async function approveChange(scope: Scope, id: string, input: unknown): Promise<void> {
  const { password } = parseInput(approveInput, input);
  await takeStep(scope, id, {
    action: 'approve',
    also: requireBaseline,
    confirm: () => confirmPassword(scope, password),
  });
}
