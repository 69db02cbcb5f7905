import { openLoop } from '../control/loop';
import { roots } from '../control/roots';
import type { IdealController, Margins, Plant } from '../control/types';
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
/** In time constants: long enough for most loops. */
const FIRST = 6.5;
/** A loop rings for about this times (Ms − 1) radians of its crossover, in time constants of their own. */
const RINGING = 1.3;
const LEAST_DEAD_TIMES = 4;
/** The search goes no further than this many steps of a response: more work than a look at the loop is worth. */
const MOST_PIECES = 100_000;
const NICE = [1, 1.2, 1.5, 2, 2.5, 3, 4, 5, 6, 8, 10];

/** The next round length: with it the scales of a plot stand still while the gains move a little. */
function roundUp(value: number): number {
  const decade = 10 ** Math.floor(Math.log10(value));
  const nice = NICE.find((step) => step * decade >= value * (1 - 1e-9)) ?? 10;
  return Number((nice * decade).toPrecision(3));
}

function roundDown(value: number): number {
  const decade = 10 ** Math.floor(Math.log10(value));
  const nice = NICE.findLast((step) => step * decade <= value * (1 + 1e-9)) ?? 1;
  return Number((nice * decade).toPrecision(3));
}

/**
 * About the sum of the closed loop's time constants: −d/ds ln of Q(s) + P(s)e^(−θs) at 0, L = P/Q·e^(−θs). What rings
 * longer than that shows in the peak of the sensitivity.
 */
function timeConstantOf(plant: Plant, controller: IdealController, margins: Margins): number {
  const { num, den, deadTimeS } = openLoop(plant, controller);
  const at = (p: readonly number[], power: number) => p[p.length - 1 - power] ?? 0;
  const slope = at(den, 1) + at(num, 1) - deadTimeS * at(num, 0);
  const sum = Math.abs(slope / (at(den, 0) + at(num, 0)));
  const { ms, msFrequency, gainCrossover } = margins;
  const frequency = gainCrossover ?? msFrequency ?? 0;
  const ringing = frequency > 0 && frequency < Infinity ? ((ms ?? 1) - 1) / frequency : 0;
  const timeConstant = Math.max(sum, RINGING * ringing, deadTimeS);
  return timeConstant > 0 && timeConstant < Infinity ? timeConstant : 1;
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
  const timeConstantS = timeConstantOf(plant, controller, margins);
  const least = LEAST_DEAD_TIMES * plant.deadTimeS;
  let horizonS = Math.max(FIRST * timeConstantS, least);
  let mostS = MOST_TIME_CONSTANTS * timeConstantS;
  for (;;) {
    const restS = restAfter(source, final, horizonS);
    if (restS === null) return { horizonS: roundDown(reachedBy(source)), settled: false };
    if (restS <= SHOWN * horizonS)
      return { horizonS: roundUp(Math.max(restS / SHOWN, least, horizonS / 50)), settled: true };
    // What rings in the plant without the loop moving it shows in the plant's poles alone.
    if (2 * horizonS > mostS) mostS = Math.max(mostS, MOST_TIME_CONSTANTS * slowestMode(plant));
    if (2 * horizonS > mostS) return { horizonS: roundUp(horizonS), settled: false };
    horizonS *= 2;
  }
}

/** From when on both responses are at rest, s; Infinity when that is later, null when it is too far to follow. */
function restAfter(source: ResponseSource, final: FinalValues, timeS: number): number | null {
  const setpoint = source.upTo('setpoint', timeS, MOST_PIECES);
  const load = source.upTo('load', timeS, MOST_PIECES);
  if (!setpoint.ok || !load.ok) return null;
  return Math.max(
    settledAfter(setpoint.value, final.setpoint, REST, 'final') ?? Infinity,
    settledAfter(load.value, final.load, REST, 'peak') ?? Infinity,
  );
}

function reachedBy(source: ResponseSource): number {
  return Math.min(source.reachedS('setpoint'), source.reachedS('load'));
}

/** Longest time constant of a decaying mode of the plant by itself, s. */
function slowestMode(plant: Plant): number {
  const decaying = roots(plant.den).filter(({ re }) => re < 0);
  return Math.max(0, ...decaying.map(({ re }) => -1 / re));
}
