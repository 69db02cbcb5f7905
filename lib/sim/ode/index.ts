import type { IdealController, Plant } from '../../control/types';
import { ok, type Result } from '../../result';
import { loadMetrics, setpointMetrics } from '../metrics';
import type { LoadResponse, SetpointResponse } from '../types';
import type { IntegrationRefusal } from './integrate';
import { limitedFinals } from '../limited-finals';
import { solveLoop, type OdeOptions } from './solve-loop';
import { trajectoryOf } from './trajectory';

export type { OdeOptions } from './solve-loop';

export interface OdeResponses {
  readonly setpoint: SetpointResponse;
  readonly load: LoadResponse;
}

const DEFAULT_POINTS = 600;

/** The engine could not finish: the loop grows without bound, or has parts too fast for its horizon. */
export class OdeRefused extends RangeError {
  constructor(
    readonly code: IntegrationRefusal,
    message: string,
  ) {
    super(message);
    this.name = 'OdeRefused';
  }
}

/**
 * Set-point and load response of a loop by adaptive extrapolation (Hairer & Wanner's ODEX): independent of the exact
 * engine in formulation and stepping, and the engine for limits, rate limits and sampled controllers.
 *
 * Definitions: a unit step of the set-point; a unit step of the load at the plant input, before the dead time. The dead
 * time is exact (method of steps), the measurement filter acts on y only. Output limits: us = min(max(v, low), high),
 * integral with back-calculation (us − v)/Tt; with a slew rate us follows that at no more than the rate, from 0 at t = 0.
 * Sampled: zero-order hold, derivative by backward difference, integral by forward Euler.
 *
 * @param plant proper, dead time ≥ 0
 * @param controller ideal form, kp ≠ 0
 * @param options horizon, points of the curves, actuator, sample time, tolerance, budget
 * @returns both responses with their figures
 * @throws RangeError for a value outside its range; OdeRefused (with a code) for a loop that grows without bound or
 *   would need more evaluations than the budget
 * Method: Hairer, Nørsett & Wanner, Solving Ordinary Differential Equations I (1993), II.9 and II.17.
 */
export function simulateOde(plant: Plant, controller: IdealController, options: OdeOptions): OdeResponses {
  const result = trySimulateOde(plant, controller, options);
  if (!result.ok) throw new OdeRefused(result.code, result.message);
  return result.value;
}

/** As `simulateOde`, with the refusals as a Result. */
export function trySimulateOde(
  plant: Plant,
  controller: IdealController,
  options: OdeOptions,
): Result<OdeResponses, IntegrationRefusal> {
  const { horizonS, points = DEFAULT_POINTS, actuator } = options;
  requireInRange(plant, controller, options);
  const setpoint = solveLoop(plant, controller, 'setpoint', options);
  if (!setpoint.ok) return setpoint;
  const load = solveLoop(plant, controller, 'load', options);
  if (!load.ok) return load;
  const finals = limitedFinals(plant, controller, actuator);
  return ok({
    setpoint: setpointMetrics(trajectoryOf(setpoint.value, horizonS), {
      horizonS,
      points,
      final: finals.setpoint,
    }),
    load: loadMetrics(trajectoryOf(load.value, horizonS), { horizonS, points, final: finals.load }),
  });
}

function requireInRange(plant: Plant, controller: IdealController, options: OdeOptions): void {
  const { horizonS, points = DEFAULT_POINTS, sampleTimeS, tolerance, actuator = {} } = options;
  const positive = (name: string, value: number | undefined): void => {
    if (value !== undefined && !(value > 0 && value < Infinity)) {
      throw new RangeError(`${name} must be above 0 and finite, got ${value}`);
    }
  };
  positive('horizonS', horizonS);
  positive('sampleTimeS', sampleTimeS);
  positive('tolerance', tolerance);
  positive('actuator.slew', actuator.slew);
  positive('actuator.trackingTimeS', actuator.trackingTimeS);
  if (!(Number.isInteger(points) && points >= 2)) {
    throw new RangeError(`points must be a whole number from 2 on, got ${points}`);
  }
  if (!(plant.deadTimeS >= 0 && plant.deadTimeS < Infinity)) {
    throw new RangeError(`plant.deadTimeS must be 0 or more, got ${plant.deadTimeS}`);
  }
  if (!(Number.isFinite(controller.kp) && controller.kp !== 0)) {
    throw new RangeError(`controller.kp must be a number other than 0, got ${controller.kp}`);
  }
  if ((actuator.low ?? -Infinity) >= (actuator.high ?? Infinity)) {
    throw new RangeError(
      `actuator.low must be below actuator.high, got ${actuator.low} and ${actuator.high}`,
    );
  }
}
