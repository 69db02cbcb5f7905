import { listMachinesWithAxes } from '@/db/queries/machines';
import { withScope } from '@/db/tx';
import { endpoint } from '@/lib/http/endpoint';
import { createMachine } from '@/lib/services/machines/create-machine';

export const GET = endpoint({
  run: async ({ session: { scope } }) => {
    const machines = await withScope(scope, (tx) => listMachinesWithAxes(tx, scope));
    return {
      items: machines.map(({ id, site, name, axes }) => ({
        id,
        site,
        name,
        axes: axes.map((axis) => axis.id),
      })),
    };
  },
});

export const POST = endpoint({
  status: 201,
  run: ({ session: { scope }, input }) => createMachine(scope, input),
});
