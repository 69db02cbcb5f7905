import type { Actuator, IdealController, Plant } from '../../control/types';
import type { Result } from '../../result';
import { limitedFinals } from '../limited-finals';
import { responseFigures, type Responses } from './figures';
import { responsesOf } from './responses';
import type { Refusal } from './stepper';

export type { Responses } from './figures';

export interface SimulationOptions {
  /** Length of the responses, s, > 0. */
  readonly horizonS: number;
  /** Points of the curves handed back, ≥ 2; 600 when not given. */
  readonly points?: number;
  /** Output limits with back-calculation of the integral. */
  readonly actuator?: Actuator;
  /** Given: the controller runs once per this time with zero-order hold, s, > 0. */
  readonly sampleTimeS?: number;
}

export const DEFAULT_POINTS = 600;

/** The response could not be followed to the horizon. */
export class ExactRefused extends RangeError {
  constructor(
    readonly code: Refusal,
    message: string,
  ) {
    super(message);
    this.name = 'ExactRefused';
  }
}

/**
 * Set-point and load response of a loop by exact stepping: the matrix exponential over each step, the delayed
 * controller output as the cubic of its own step, limits and samples met to the moment.
 *
 * Definitions: unit step of the set-point; unit step of the load at the plant input, before the dead time, which is
 * exact (method of steps). The measurement filter acts on y only. Limits: us = min(max(v, low), high) with
 * back-calculation (us − v)/Tt. Sampled: zero-order hold, derivative by backward difference, integral by forward Euler.
 *
 * @param plant order up to 20, proper, dead time ≥ 0
 * @param controller ideal form
 * @returns both responses with their figures, errors below 1e-5 of the peak
 * @throws RangeError for a value outside its range; ExactRefused for a loop that grows without bound, or a horizon of
 *   more than a million steps
 */
export function simulateExact(
  plant: Plant,
  controller: IdealController,
  options: SimulationOptions,
): Responses {
  const result = trySimulateExact(plant, controller, options);
  if (!result.ok) throw new ExactRefused(result.code, result.message);
  return result.value;
}

/** As `simulateExact`, with the refusals as a Result. */
export function trySimulateExact(
  plant: Plant,
  controller: IdealController,
  options: SimulationOptions,
): Result<Responses, Refusal> {
  const { horizonS, points = DEFAULT_POINTS, actuator, sampleTimeS } = options;
  requireInRange(options);
  const source = responsesOf(plant, controller, { actuator, sampleTimeS });
  return responseFigures(source, limitedFinals(plant, controller, actuator), horizonS, points);
}

/** @throws RangeError for options outside their range */
export function requireInRange(options: SimulationOptions): void {
  const { horizonS, points = DEFAULT_POINTS, actuator = {}, sampleTimeS } = options;
  const positive = { horizonS, sampleTimeS, 'actuator.trackingTimeS': actuator.trackingTimeS };
  for (const [name, value] of Object.entries(positive))
    if (value !== undefined && !(value > 0 && value < Infinity))
      throw new RangeError(`${name} must be above 0 s and finite, got ${value}`);
  if (!(Number.isInteger(points) && points >= 2))
    throw new RangeError(`points must be a whole number from 2 on, got ${points}`);
  const { low = -Infinity, high = Infinity, slew } = actuator;
  if (!(low < high)) throw new RangeError(`actuator.low must be below actuator.high, got ${low} and ${high}`);
  if (slew !== undefined && sampleTimeS === undefined)
    throw new RangeError('actuator.slew: a rate limit is followed by the other engine only');
}
