import { sheetAnswer } from '@/lib/http/change-answer';
import { endpoint } from '@/lib/http/endpoint';
import { readChange } from '@/lib/services/changes/read-change';

export const GET = endpoint({
  run: async ({ session: { scope }, params }) => sheetAnswer(await readChange(scope, params.change)),
});
