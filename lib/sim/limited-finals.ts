import { trimmed } from '../control/polynomial';
import type { Actuator, IdealController, Plant } from '../control/types';
import { finalValues, type FinalValues } from './final-values';

/**
 * Final values of the loop with limits: those of the linear loop where the output that holds them lies within the
 * limits; else the plant's static gain times the limit that is reached (and the load). A plant with integrator that
 * cannot be held runs away: ±Infinity. A sampled controller comes to rest where the continuous one does.
 */
export function limitedFinals(
  plant: Plant,
  controller: IdealController,
  actuator: Actuator = {},
): FinalValues {
  const linear = finalValues(plant, controller);
  const num = trimmed(plant.num);
  const den = trimmed(plant.den);
  const staticGain = num[num.length - 1] / den[den.length - 1];
  const { low = -Infinity, high = Infinity } = actuator;
  const held = (final: number, load: number, demand: number): number => {
    const output = Number.isFinite(staticGain) ? final / staticGain - load : demand;
    const limit = Math.min(Math.max(output, low), high);
    if (limit === output || Number.isNaN(output)) return final;
    // With an integrator in the plant, 0 · ∞ cannot arise: the limit differs from the output that holds y.
    return staticGain * (limit + load);
  };
  return { setpoint: held(linear.setpoint, 0, 0), load: held(linear.load, 1, -1) };
}
