import { z } from 'zod';
import { validatePlant, parsePlantText } from '../control/plant-text';
import { idealController, type Actuator, type IdealController, type Plant } from '../control/types';
import type { Requirement } from '../requirement';
import { isShowable, line, NOT_SHOWABLE } from './fields';

/**
 * The shapes of a loop as the public API writes them, read into the objects of the control core. Infinite values are
 * "inf" outside and Infinity inside.
 */
const LARGEST = 1e15;
const SMALLEST = 1e-15;
const RANGE = `Must be 0 or of a size between ${SMALLEST} and ${LARGEST}: nothing beyond can be computed with.`;
const computable = (value: number) =>
  value === 0 || (Math.abs(value) >= SMALLEST && Math.abs(value) <= LARGEST);

const finite = z.number().refine(computable, RANGE);
const positive = z.number().positive().refine(computable, RANGE);
const notNegative = z.number().min(0).refine(computable, RANGE);
/** A plant's coefficients have a wider range of their own, judged with the plant. */
const coefficients = z
  .array(z.number())
  .min(1, 'Give at least one coefficient.')
  .max(41, 'Too many coefficients.');

/** A plant by its coefficients in descending powers, or as a text in any accepted notation. */
export const plantShape = z
  .union(
    [
      z.object({ text: z.string().max(4000).refine(isShowable, NOT_SHOWABLE) }),
      z.object({ num: coefficients, den: coefficients, delay: z.number().optional() }),
    ],
    { error: 'Give the plant as {num, den, delay} with lists of finite numbers, or as {text}.' },
  )
  .transform((given, context): { plant: Plant; text?: string } => {
    const read =
      'text' in given ? parsePlantText(given.text) : validatePlant(given.num, given.den, given.delay ?? 0);
    if (!read.ok) {
      context.addIssue({ code: 'custom', message: read.message, params: { impossible: true } });
      return z.NEVER;
    }
    return 'text' in given
      ? { plant: (read.value as { plant: Plant }).plant, text: given.text }
      : { plant: read.value as Plant };
  });

/** The controller in the ideal form; ti "inf" = no integral, td 0 = no derivative. */
export const controllerShape = z
  .object({
    kp: finite.refine((kp) => kp !== 0, 'The gain must not be 0: such a controller does nothing.'),
    ti: z.union([positive, z.literal('inf')]).optional(),
    td: notNegative.optional(),
    n: positive.optional(),
    b: finite.optional(),
    c: finite.optional(),
    tf: notNegative.optional(),
    filterOrder: z.union([z.literal(1), z.literal(2)]).optional(),
  })
  .transform((given): IdealController => {
    const { kp, ti, td, n, b, c, tf, filterOrder } = given;
    const set = Object.fromEntries(
      Object.entries({ td, n, b, c }).filter(([, value]) => value !== undefined),
    );
    return idealController({
      kp,
      ...set,
      ...(ti === undefined ? {} : { ti: ti === 'inf' ? Infinity : ti }),
      ...(tf ? { filter: { timeConstantS: tf, order: filterOrder ?? 1 } } : {}),
    });
  });

export const actuatorShape = z
  .object({
    low: finite.optional(),
    high: finite.optional(),
    slew: positive.optional(),
    trackingTime: positive.optional(),
  })
  .refine(({ low, high }) => low === undefined || high === undefined || low < high, {
    message: 'The lower limit must be below the upper one.',
    path: ['low'],
  })
  .transform(({ trackingTime, ...limits }): Actuator => ({
    ...limits,
    ...(trackingTime === undefined ? {} : { trackingTimeS: trackingTime }),
  }));

export const requirementShape = z
  .strictObject({
    overshootMax: notNegative,
    settlingTimeMax: positive,
    riseTimeMax: positive,
    gainMarginMin: positive,
    phaseMarginMin: positive,
    msMax: positive,
    delayMarginMin: positive,
    loadPeakMax: positive,
    loadRecoveryMax: positive,
    controlPeakMax: positive,
  })
  .partial()
  .transform((given): Requirement => given);

export const loadCasesShape = z
  .array(z.object({ name: line(60, 'Give the load case a name.'), plant: plantShape }))
  .min(1, 'At least one load case is needed.')
  .max(12, 'At most 12 load cases.')
  .refine(
    (cases) => new Set(cases.map(({ name }) => name)).size === cases.length,
    'Two load cases have the same name.',
  );

/** What an axis' plant is given as: one plant (the load case "nominal"), or several named load cases. */
export const plantOrLoadCases = { plant: plantShape.optional(), loadCases: loadCasesShape.optional() };

export type LoadCaseInput = z.output<typeof loadCasesShape>[number];

/** The load cases of a request that gives either a plant or load cases. */
export function loadCasesOf(input: {
  plant?: z.output<typeof plantShape>;
  loadCases?: LoadCaseInput[];
}): LoadCaseInput[] | null {
  if (input.loadCases) return input.loadCases;
  return input.plant ? [{ name: 'nominal', plant: input.plant }] : null;
}
