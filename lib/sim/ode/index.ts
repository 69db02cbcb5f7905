import type { IdealController, Plant } from '../../control/types';
import { finalValues } from '../final-values';
import { loadMetrics, setpointMetrics, Trajectory } from '../metrics';
import type { LoadResponse, SetpointResponse } from '../types';
import { solveLoop, type OdeOptions, type SolvedResponse } from './solve-loop';

/** Cubics into which each of the solver's long steps is cut for the figures. */
const CUTS = 12;
const DEFAULT_POINTS = 600;

/** The solution as short cubics in the units of the plant; where it jumps, the step ends there anyway. */
function trajectoryOf({ solution, timeUnitS, yUnit, uUnit }: SolvedResponse, horizonS: number): Trajectory {
  const trajectory = new Trajectory(solution.count * CUTS);
  for (let piece = 0; piece < solution.count; piece += 1) {
    const from = solution.from[piece];
    const length = solution.to[piece] - from;
    const rate = 2 / (length * timeUnitS);
    for (let cut = 0; cut < CUTS; cut += 1) {
      const last = piece === solution.count - 1 && cut === CUTS - 1;
      const index = trajectory.add(last ? horizonS : (from + (length * (cut + 1)) / CUTS) * timeUnitS);
      const a = (2 * cut) / CUTS - 1;
      const b = (2 * (cut + 1)) / CUTS - 1;
      trajectory.y0[index] = yUnit * solution.y.value(piece, a);
      trajectory.dy0[index] = yUnit * rate * solution.y.slope(piece, a);
      trajectory.y1[index] = yUnit * solution.y.value(piece, b);
      trajectory.dy1[index] = yUnit * rate * solution.y.slope(piece, b);
      trajectory.u0[index] = uUnit * solution.output.value(piece, a);
      trajectory.du0[index] = uUnit * rate * solution.output.slope(piece, a);
      trajectory.u1[index] = uUnit * solution.output.value(piece, b);
      trajectory.du1[index] = uUnit * rate * solution.output.slope(piece, b);
    }
  }
  return trajectory;
}

/** Steady gain G(0) of a plant without integrator. */
function steadyGain({ num, den }: Plant): number {
  return num[num.length - 1] / den[den.length - 1];
}

/** With limits a loop may stay at one of them: its y then goes to G(0)·us, not to what the linear loop says. */
function limitedFinal(
  trajectory: Trajectory,
  plant: Plant,
  linear: number,
  load: number,
  options: OdeOptions,
): number {
  const { low = -Infinity, high = Infinity } = options.actuator ?? {};
  const output = trajectory.u1[trajectory.count - 1];
  const gain = steadyGain(plant);
  const stuck = output <= low || output >= high;
  return stuck && Number.isFinite(gain) ? gain * (output + load) : linear;
}

/**
 * Set-point and load response of a loop by the adaptive extrapolation method (Hairer, Nørsett and Wanner's ODEX) with
 * exact dead time from a dense history, output limits with back-calculation, and sampled controllers.
 *
 * @returns null when the equations need more evaluations than the budget allows
 * @throws RangeError for options outside their range
 */
export function simulateOde(
  plant: Plant,
  controller: IdealController,
  options: OdeOptions,
): { setpoint: SetpointResponse; load: LoadResponse } | null {
  const setpoint = solveLoop(plant, controller, 'setpoint', options);
  const load = solveLoop(plant, controller, 'load', options);
  if (!setpoint.ok || !load.ok) return null;
  const { horizonS, points = DEFAULT_POINTS } = options;
  const linear = finalValues(plant, controller);
  const responses = [trajectoryOf(setpoint.value, horizonS), trajectoryOf(load.value, horizonS)];
  const final = {
    setpoint: limitedFinal(responses[0], plant, linear.setpoint, 0, options),
    load: limitedFinal(responses[1], plant, linear.load, 1, options),
  };
  return {
    setpoint: setpointMetrics(responses[0], { horizonS, points, final: final.setpoint }),
    load: loadMetrics(responses[1], { horizonS, points, final: final.load }),
  };
}
