import { z } from 'zod';
import { line, rowVersion } from './fields';

const unit = line(16, 'State the unit, as it stands on the display.');
const number = z.number('Type a number.').min(-1e12, 'Beyond any unit.').max(1e12, 'Beyond any unit.');
const positive = number.positive('Must be above 0.');

/** How the target controller wants its gains. More of lib/control/forms can be stated as data later. */
export const conventionInput = z
  .object({
    form: z.enum(['ideal', 'parallel', 'series']),
    gain: z.enum(['gain', 'proportional-band']),
    integral: z.enum(['seconds', 'minutes', 'repeats-per-minute', 'gain', 'per-sample']),
    derivative: z.enum(['seconds', 'minutes', 'gain', 'per-sample']),
    inputSpan: positive.optional(),
    outputSpan: positive.optional(),
    decimals: z.int('A whole number of decimals.').min(0).max(9).optional(),
  })
  .refine(({ inputSpan, outputSpan }) => (inputSpan === undefined) === (outputSpan === undefined), {
    message: 'State both spans or neither.',
    path: ['inputSpan'],
  })
  .refine(({ gain, inputSpan }) => gain !== 'proportional-band' || inputSpan !== undefined, {
    message: 'A proportional band in % needs both spans.',
    path: ['inputSpan'],
  });

const axisFields = z.object({
  tag: line(40, 'Give the axis its tag.'),
  name: line(80, 'Say what it moves or heats.'),
  measurementUnit: unit,
  outputUnit: unit,
  actuatorLow: number.optional(),
  actuatorHigh: number.optional(),
  actuatorSlew: positive.optional(),
  sampleTimeS: positive.optional(),
  deviceLabel: line(80).default(''),
  convention: conventionInput,
});

type AxisFields = z.output<typeof axisFields>;

function perSampleNeedsTime({ convention, sampleTimeS }: AxisFields): boolean {
  const perSample = convention.integral === 'per-sample' || convention.derivative === 'per-sample';
  return !perSample || sampleTimeS !== undefined;
}

function limitsInOrder({ actuatorLow, actuatorHigh }: AxisFields): boolean {
  return actuatorLow === undefined || actuatorHigh === undefined || actuatorLow < actuatorHigh;
}

const LIMITS = { message: 'The lower limit must be below the upper one.', path: ['actuatorLow'] };
const PER_SAMPLE = { message: 'Gains per sample need the sample time.', path: ['sampleTimeS'] };

export const axisInput = axisFields
  .extend({ machineId: z.uuid() })
  .refine(limitsInOrder, LIMITS)
  .refine(perSampleNeedsTime, PER_SAMPLE);

export const axisEdit = axisFields
  .extend({ rowVersion })
  .refine(limitsInOrder, LIMITS)
  .refine(perSampleNeedsTime, PER_SAMPLE);
