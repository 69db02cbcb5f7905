import { describePlant } from '@/lib/control/describe';
import { parsePlantText } from '@/lib/control/plant-text';
import { FettleError } from '@/lib/errors';
import { endpoint } from '@/lib/http/endpoint';
import { parseRequest } from '@/lib/schemas/calculation';

export const POST = endpoint({
  schema: parseRequest,
  run: async ({ input }) => {
    const read = parsePlantText(input.text);
    if (!read.ok)
      throw new FettleError('INVALID', read.message, {
        fields: [{ path: read.at === undefined ? 'text' : `text@${read.at}`, message: read.message }],
      });
    const { plant, notation, warnings } = read.value;
    const { poles, zeros, dcGain, order } = describePlant(plant);
    return {
      num: plant.num,
      den: plant.den,
      delay: plant.deadTimeS,
      poles,
      zeros,
      dcGain,
      order,
      notation,
      warnings,
    };
  },
});
