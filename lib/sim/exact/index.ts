import type { Actuator, IdealController, Plant } from '../../control/types';
import { limitedFinals } from '../limited-finals';
import type { LoadResponse, SetpointResponse } from '../types';
import { responseFigures } from './figures';
import { responsesOf } from './responses';

export interface SimulationOptions {
  /** Length of the responses, s, > 0. */
  readonly horizonS: number;
  /** Points of the curves handed back, ≥ 2; 600 when not given. */
  readonly points?: number;
  /** Output limits, with back-calculation of the integral. */
  readonly actuator?: Actuator;
  /** Given: the controller runs once per this time with zero-order hold, s. */
  readonly sampleTimeS?: number;
}

const DEFAULT_POINTS = 600;

/**
 * Set-point and load response of a stable linear loop by exact stepping: the matrix exponential over each step, and
 * with dead time the method of steps with the delayed controller output as the cubic of its own step.
 *
 * @param plant order up to 20, exact dead time
 * @param controller ideal form; its filter acts on y only
 * @throws RangeError for a horizon that is not a positive number, or for a plant or controller outside its range
 */
export function simulateExact(
  plant: Plant,
  controller: IdealController,
  options: SimulationOptions,
): { setpoint: SetpointResponse; load: LoadResponse } {
  const { horizonS, points = DEFAULT_POINTS, actuator } = options;
  if (!(horizonS > 0 && horizonS < Infinity))
    throw new RangeError(`horizonS must be above 0 s and finite, got ${horizonS}`);
  if (!(Number.isInteger(points) && points >= 2))
    throw new RangeError(`points must be a whole number from 2 on, got ${points}`);
  const source = responsesOf(plant, controller, options);
  return responseFigures(source, limitedFinals(plant, controller, actuator), horizonS, points);
}
