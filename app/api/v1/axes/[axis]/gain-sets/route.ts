import { getAxis } from '@/db/queries/axes';
import { listGainSets } from '@/db/queries/gain-sets';
import { withScope } from '@/db/tx';
import { notFound } from '@/lib/errors';
import { checkAnswer, verdictAnswer } from '@/lib/http/check-answer';
import { endpoint } from '@/lib/http/endpoint';
import { numberCursor, pageAnswer, pageOf } from '@/lib/http/paging';
import { asId } from '@/lib/ids';
import { keepGainSet } from '@/lib/services/gain-sets/keep-gain-set';

export const GET = endpoint({
  run: async ({ session: { scope }, params, query }) => {
    const { limit, after } = pageOf(query);
    const axisId = asId(params.axis, 'axis');
    const rows = await withScope(scope, async (tx) => {
      if (!(await getAxis(tx, scope, { id: axisId }))) throw notFound('axis');
      return listGainSets(tx, scope, { axisId, limit: limit + 1, after: numberCursor(after) });
    });
    return pageAnswer(
      rows,
      limit,
      ({ verdict, ...row }) => ({ ...row, verdict: verdictAnswer(verdict) }),
      ({ version }) => String(version),
    );
  },
});

export const POST = endpoint({
  status: 201,
  run: async ({ session: { scope }, params, input }) => {
    const { id, version, checks } = await keepGainSet(scope, params.axis, input);
    const { check } = checks.checks[checks.worst.index];
    return {
      id,
      version,
      check: { ...checkAnswer(check), loadCase: checks.worst.name, verdict: verdictAnswer(checks.verdict) },
    };
  },
});
