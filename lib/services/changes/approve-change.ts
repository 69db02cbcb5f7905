import { confirmPassword } from '../../auth/confirm-password';
import type { Scope } from '../../auth/scope';
import { approveInput } from '../../schemas/change';
import { FettleError } from '../../errors';
import { parseInput } from '../parse-input';
import { requireBaseline } from './baseline';
import { takeStep, type StepContext } from './take-step';

const NOT_SIGNED = { path: 'password', message: 'That is not your password. Nothing was signed.' };

function requireContent({ change }: StepContext, hash: string | undefined): void {
  if (hash === undefined || hash === change.contentHash) return;
  throw new FettleError('CONFLICT', 'The change is no longer what you read. Load it again before you sign.');
}

/** Signs a submitted change: another person than its author, with the password again. */
export async function approveChange(scope: Scope, id: string, input: unknown): Promise<void> {
  const { password, hash } = parseInput(approveInput, input);
  await takeStep(scope, id, {
    action: 'approve',
    also: async (context) => {
      requireContent(context, hash);
      requireBaseline(context);
    },
    confirm: async () => {
      await confirmPassword(scope, password, NOT_SIGNED);
    },
  });
}
