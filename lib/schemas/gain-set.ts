import { z } from 'zod';
import { line, paragraph } from './fields';
import { actuatorShape, controllerShape, plantOrLoadCases, requirementShape } from './loop';

export const keepGainSetInput = z
  .object({
    ...plantOrLoadCases,
    controller: controllerShape,
    rule: line(60).optional(),
    settings: z.record(line(60), z.union([line(200), z.number(), z.boolean()])).optional(),
    requirement: requirementShape.optional(),
    actuator: actuatorShape.optional(),
    sampleTime: z.number().min(1e-9).max(1e9).optional(),
    reason: paragraph(2000, 'Say why in a few words.'),
  })
  .refine(({ plant, loadCases }) => (plant === undefined) !== (loadCases === undefined), {
    message: 'Give either a plant or load cases.',
    path: ['plant'],
  });

export type KeepGainSetInput = z.output<typeof keepGainSetInput>;
