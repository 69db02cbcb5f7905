import { roots } from '../control/roots';
import type { IdealController, Margins, Plant } from '../control/types';
import { characteristic } from './exact/loop-scales';
import { responsesOf, type ResponseSource } from './exact/responses';
import { finalValues, type FinalValues } from './final-values';
import { settledAfter } from './metrics';

export interface Horizon {
  readonly horizonS: number;
  /** Both responses stay within 0.5 % for the last fifth of it. */
  readonly settled: boolean;
}

/** Share of the final value, or of the peak after a load step, within which a response counts as at rest. */
const REST = 0.005;
/** The last fifth of the horizon must be at rest. */
const SHOWN = 0.8;
const MOST_TIME_CONSTANTS = 200;
/** With dead time the slowest mode is not known beforehand: the search may go on longer than its crossover suggests. */
const SEARCH = 100;
const LEAST_DEAD_TIMES = 4;
const DOUBLINGS = 11;
const NICE = [1, 1.2, 1.5, 2, 2.5, 3, 4, 5, 6, 8, 10];

/** The next round length: with it the scales of a plot stand still while the gains move a little. */
function roundUp(value: number): number {
  const decade = 10 ** Math.floor(Math.log10(value));
  const nice = NICE.find((step) => step * decade >= value * (1 - 1e-9)) ?? 10;
  return Number((nice * decade).toPrecision(3));
}

/** A first guess, and what is too long in any case. */
function bounds(
  plant: Plant,
  controller: IdealController,
  margins: Margins,
): { first: number; most: number } {
  if (plant.deadTimeS === 0) {
    const slowest = Math.min(...roots(characteristic(plant, controller)).map(({ re }) => -re));
    const timeConstant = Number.isFinite(slowest) && slowest > 0 ? 1 / slowest : 1;
    return { first: 8 * timeConstant, most: MOST_TIME_CONSTANTS * timeConstant };
  }
  const crossover = margins.gainCrossover ?? margins.phaseCrossover;
  const timeConstant = crossover && Number.isFinite(crossover) ? 1 / crossover : plant.deadTimeS;
  const slow = Number.isFinite(controller.ti) ? Math.max(timeConstant, controller.ti / 4) : timeConstant;
  return {
    first: Math.max(10 * plant.deadTimeS, 12 * slow),
    most: SEARCH * MOST_TIME_CONSTANTS * Math.max(slow, plant.deadTimeS),
  };
}

/**
 * A horizon that shows both responses of a stable loop at rest: they stay within 0.5 % for its last fifth; at least 4
 * dead times, at most 200 closed-loop time constants. `settled` is false when that is not long enough.
 *
 * @param margins of the linear loop; its crossover tells where to begin
 * @param source the responses; those of the linear loop when not given
 * @param final where the responses end
 */
export function automaticHorizon(
  plant: Plant,
  controller: IdealController,
  margins: Margins,
  source: ResponseSource = responsesOf(plant, controller),
  final: FinalValues = finalValues(plant, controller),
): Horizon {
  const { first, most } = bounds(plant, controller, margins);
  const least = LEAST_DEAD_TIMES * plant.deadTimeS;
  let horizonS = Math.max(first, least);
  for (let i = 0; i < DOUBLINGS; i += 1) {
    const needed = timeToRest(source, final, horizonS);
    if (needed === 'never') break;
    if (needed !== null && needed <= SHOWN * horizonS)
      return { horizonS: roundUp(Math.max(needed / SHOWN, least, horizonS / 50)), settled: true };
    if (2 * horizonS > most) break;
    horizonS *= 2;
  }
  return { horizonS: roundUp(horizonS), settled: false };
}

/** Time from which both responses are at rest; null when that is later than the time followed. */
function timeToRest(source: ResponseSource, final: FinalValues, timeS: number): number | null | 'never' {
  const setpoint = source.upTo('setpoint', timeS);
  const load = source.upTo('load', timeS);
  if (!setpoint.ok || !load.ok) return 'never';
  const setpointRest = settledAfter(setpoint.value, final.setpoint, REST, 'final');
  const loadRest = settledAfter(load.value, final.load, REST, 'peak');
  return setpointRest === null || loadRest === null ? null : Math.max(setpointRest, loadRest);
}
