import { listChanges } from '@/db/queries/changes';
import { withScope } from '@/db/tx';
import { CHANGE_STATES, type ChangeState } from '@/lib/change';
import { FettleError } from '@/lib/errors';
import { changeLineAnswer } from '@/lib/http/change-answer';
import { endpoint } from '@/lib/http/endpoint';
import { numberCursor, pageAnswer, pageOf } from '@/lib/http/paging';
import { asId } from '@/lib/ids';
import { createChange } from '@/lib/services/changes/create-change';

function statesOf(text: string | null): ChangeState[] | undefined {
  if (text === null) return undefined;
  return text.split(',').map((word) => {
    const state = CHANGE_STATES.find((one) => one === word);
    if (!state) throw new FettleError('MALFORMED', `state must be among ${CHANGE_STATES.join(', ')}.`);
    return state;
  });
}

export const GET = endpoint({
  run: async ({ session: { scope }, query }) => {
    const { limit, after } = pageOf(query);
    const axis = query.get('axis');
    const params = {
      limit: limit + 1,
      after: numberCursor(after),
      states: statesOf(query.get('state')),
      axisId: axis === null ? undefined : asId(axis, 'axis'),
    };
    const rows = await withScope(scope, (tx) => listChanges(tx, scope, params));
    return pageAnswer(rows, limit, changeLineAnswer, ({ number }) => String(number));
  },
});

export const POST = endpoint({
  status: 201,
  run: ({ session: { scope }, input }) => createChange(scope, input),
});
