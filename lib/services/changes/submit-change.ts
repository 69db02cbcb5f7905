import type { Scope } from '../../auth/scope';
import { requireBaseline } from './baseline';
import { takeStep } from './take-step';

/** Hands a draft to the approvers. */
export async function submitChange(scope: Scope, id: string): Promise<void> {
  await takeStep(scope, id, { action: 'submit', also: async (context) => requireBaseline(context) });
}
