import { getAxis } from '@/db/queries/axes';
import { withScope } from '@/db/tx';
import { notFound } from '@/lib/errors';
import { axisAnswer } from '@/lib/http/axis-answer';
import { endpoint } from '@/lib/http/endpoint';
import { asId } from '@/lib/ids';
import { updateAxis } from '@/lib/services/axes/update-axis';

export const GET = endpoint({
  run: async ({ session: { scope }, params }) => {
    const id = asId(params.axis, 'axis');
    const axis = await withScope(scope, (tx) => getAxis(tx, scope, { id }));
    if (!axis) throw notFound('axis');
    return axisAnswer(axis);
  },
});

export const PATCH = endpoint({
  run: ({ session: { scope }, params, input }) => updateAxis(scope, params.axis, input),
});
