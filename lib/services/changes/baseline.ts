import { FettleError } from '../../errors';
import type { StepContext } from './take-step';

/** The change was drafted from one version; if another is in service by now, what was reviewed no longer holds. */
export function requireBaseline({ change, axis }: StepContext): void {
  if (axis.inServiceGainSetId === change.fromGainSetId) return;
  throw new FettleError(
    'CONFLICT',
    `The version in service on ${axis.tag} is no longer the one this change starts from. Withdraw it and draft it again.`,
  );
}
