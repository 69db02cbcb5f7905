import { z } from 'zod';
import { RULES, type RuleId } from '../control/rules';
import { actuatorShape, controllerShape, plantOrLoadCases, plantShape, requirementShape } from './loop';

const positive = z.number().min(1e-15, 'Must be above 0, 1e-15 or more.').max(1e15, 'Must be 1e15 or less.');

export const parseRequest = z.object({ text: z.string().max(4000) });

export const reduceRequest = z.object({ plant: plantShape, to: z.enum(['fopdt', 'sopdt', 'integrating']) });

const ruleIds = RULES.map(({ id }) => id) as [RuleId, ...RuleId[]];

export const tuneRequest = z
  .object({
    plant: plantShape.optional(),
    ultimate: z
      .object({ ku: z.number().refine((ku) => ku !== 0, 'The ultimate gain is not 0.'), tu: positive })
      .optional(),
    rule: z.enum(ruleIds),
    type: z.enum(['P', 'PI', 'PD', 'PID', 'I']),
    aggressiveness: z.number().min(0).max(1).optional(),
    lambda: positive.optional(),
    variant: z.string().max(60).optional(),
    dampingRatio: positive.optional(),
    naturalFrequency: positive.optional(),
  })
  .refine(({ plant, ultimate }) => plant !== undefined || ultimate !== undefined, {
    message: 'Give a plant, or an ultimate gain and period.',
    path: ['plant'],
  });

export const checkRequest = z
  .object({
    ...plantOrLoadCases,
    controller: controllerShape,
    actuator: actuatorShape.optional(),
    sampleTime: positive.optional(),
    requirement: requirementShape.optional(),
    horizon: positive.optional(),
    points: z.int().min(2).max(20_000).optional(),
  })
  .refine(({ plant, loadCases }) => (plant === undefined) !== (loadCases === undefined), {
    message: 'Give either a plant or load cases.',
    path: ['plant'],
  });

const conversionTarget = z.object({
  form: z.enum(['ideal', 'parallel', 'series']),
  gain: z.enum(['gain', 'proportional-band']).default('gain'),
  integral: z.enum(['seconds', 'minutes', 'repeats-per-minute', 'gain', 'per-sample']).default('seconds'),
  derivative: z.enum(['seconds', 'minutes', 'gain', 'per-sample']).default('seconds'),
  sampleTime: positive.optional(),
  inputSpan: positive.optional(),
  outputSpan: positive.optional(),
  scale: positive.optional(),
  integer: z.boolean().optional(),
});

/** To the target's form and units, or with `values` the way back from them. */
export const convertRequest = z
  .object({
    controller: controllerShape.optional(),
    values: z.record(z.string(), z.number()).optional(),
    to: conversionTarget,
  })
  .refine(({ controller, values }) => (controller === undefined) !== (values === undefined), {
    message: 'Give either a controller (there) or values (the way back).',
    path: ['controller'],
  });
