import { getMachine } from '@/db/queries/machines';
import { withScope } from '@/db/tx';
import { notFound } from '@/lib/errors';
import { endpoint } from '@/lib/http/endpoint';
import { asId } from '@/lib/ids';
import { updateMachine } from '@/lib/services/machines/update-machine';

export const GET = endpoint({
  run: async ({ session: { scope }, params }) => {
    const id = asId(params.machine, 'machine');
    const machine = await withScope(scope, (tx) => getMachine(tx, scope, { id }));
    if (!machine) throw notFound('machine');
    return machine;
  },
});

export const PATCH = endpoint({
  run: ({ session: { scope }, params, input }) => updateMachine(scope, params.machine, input),
});
