import { z } from 'zod';
import { actuatorShape, controllerShape, plantOrLoadCases, requirementShape } from './loop';

export const keepGainSetInput = z
  .object({
    ...plantOrLoadCases,
    controller: controllerShape,
    rule: z.string().max(60).optional(),
    settings: z
      .record(z.string().max(60), z.union([z.string().max(200), z.number(), z.boolean()]))
      .optional(),
    requirement: requirementShape.optional(),
    actuator: actuatorShape.optional(),
    sampleTime: z.number().min(1e-9).max(1e9).optional(),
    reason: z.string().trim().min(1, 'Say why in a few words.').max(2000),
  })
  .refine(({ plant, loadCases }) => (plant === undefined) !== (loadCases === undefined), {
    message: 'Give either a plant or load cases.',
    path: ['plant'],
  });

export type KeepGainSetInput = z.output<typeof keepGainSetInput>;
