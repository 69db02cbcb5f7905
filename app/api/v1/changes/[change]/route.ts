import { changeAnswer } from '@/lib/http/change-answer';
import { endpoint } from '@/lib/http/endpoint';
import { readChange } from '@/lib/services/changes/read-change';
import { updateChange } from '@/lib/services/changes/update-change';

export const GET = endpoint({
  run: async ({ session: { scope }, params }) => changeAnswer(await readChange(scope, params.change)),
});

export const PATCH = endpoint({
  run: async ({ session: { scope }, params, input }) => {
    await updateChange(scope, params.change, input);
    return changeAnswer(await readChange(scope, params.change));
  },
});
