import { reducePlant } from '@/lib/control/reduction/reduce';
import { FettleError } from '@/lib/errors';
import { endpoint } from '@/lib/http/endpoint';
import { reduceRequest } from '@/lib/schemas/calculation';

export const POST = endpoint({
  schema: reduceRequest,
  run: async ({ input }) => {
    const reduced = reducePlant(input.plant.plant, input.to);
    if (!reduced.ok) throw new FettleError('INVALID', reduced.message);
    const { model, plant, method, error } = reduced.value;
    const { thetaS, ...rest } = model;
    return {
      model: { ...rest, theta: thetaS },
      num: plant.num,
      den: plant.den,
      delay: plant.deadTimeS,
      method,
      error,
    };
  },
});
