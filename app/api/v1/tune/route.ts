import { tune } from '@/lib/control/rules';
import { FettleError } from '@/lib/errors';
import { endpoint } from '@/lib/http/endpoint';
import { tuneRequest } from '@/lib/schemas/calculation';

export const POST = endpoint({
  schema: tuneRequest,
  run: async ({ input }) => {
    const { plant, lambda, ...rest } = input;
    const tuned = tune({ ...rest, plant: plant?.plant, lambdaS: lambda });
    if (!tuned.ok) throw new FettleError('INVALID', tuned.message);
    return tuned.value;
  },
});
