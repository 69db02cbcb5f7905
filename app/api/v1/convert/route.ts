import { convert, fromDevice, type DeviceNumbers } from '@/lib/control/forms';
import { FettleError } from '@/lib/errors';
import { endpoint } from '@/lib/http/endpoint';
import { convertRequest } from '@/lib/schemas/calculation';

export const POST = endpoint({
  schema: convertRequest,
  run: async ({ input }) => {
    const { sampleTime, ...target } = input.to;
    const convention = { ...target, ...(sampleTime === undefined ? {} : { sampleTimeS: sampleTime }) };
    const converted = input.controller
      ? convert(input.controller, convention)
      : fromDevice(input.values as unknown as DeviceNumbers, convention);
    if (!converted.ok) throw new FettleError('INVALID', converted.message);
    return input.controller ? converted.value : { controller: converted.value };
  },
});
