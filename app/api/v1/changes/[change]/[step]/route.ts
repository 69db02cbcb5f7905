import type { Scope } from '@/lib/auth/scope';
import { notFound } from '@/lib/errors';
import { changeAnswer } from '@/lib/http/change-answer';
import { endpoint } from '@/lib/http/endpoint';
import { applyChange } from '@/lib/services/changes/apply-change';
import { approveChange } from '@/lib/services/changes/approve-change';
import { issueChange } from '@/lib/services/changes/issue-change';
import { readChange } from '@/lib/services/changes/read-change';
import { returnChange } from '@/lib/services/changes/return-change';
import { rollBackChange } from '@/lib/services/changes/roll-back-change';
import { submitChange } from '@/lib/services/changes/submit-change';
import { verifyChange } from '@/lib/services/changes/verify-change';
import { withdrawChange } from '@/lib/services/changes/withdraw-change';

type Step = (scope: Scope, id: string, input: unknown) => Promise<void>;

const STEPS = new Map<string, Step>([
  ['submit', submitChange],
  ['approve', approveChange],
  ['return', returnChange],
  ['withdraw', withdrawChange],
  ['issue', issueChange],
  ['apply', applyChange],
  ['verify', verifyChange],
  ['roll-back', rollBackChange],
]);

export const POST = endpoint({
  run: async ({ session: { scope }, params, input }) => {
    const step = STEPS.get(params.step);
    if (!step) throw notFound('step of a change');
    await step(scope, params.change, input);
    return changeAnswer(await readChange(scope, params.change));
  },
});
