import { openLoop } from '../../control/loop';
import { add, trimmed } from '../../control/polynomial';
import type { Actuator, IdealController, Plant } from '../../control/types';
import type { StepKind } from './spaces';

/** Step times the fastest rate with which a run begins. */
const FIRST = 0.15;
/** No step is shorter than this share of the first one, or of the dead time. */
const LEAST = 1 / 16;
const LEAST_OF_GRID = 1 / 256;
/** Expected size of a response: this share of what the gains suggest. */
const SMALL = 0.02;

/** Steps are powers of two times the base: the level to begin with and the lowest one. */
export interface Levels {
  readonly baseS: number;
  readonly firstLevel: number;
  readonly leastLevel: number;
}

/** @param rate fastest motion, 1/s; @param gridS dead time or sample time that steps divide, 0 for none */
export function levelsFor(rate: number, gridS: number): Levels {
  const firstStepS = rate > 0 ? FIRST / rate : gridS || 1;
  const baseS = gridS || firstStepS;
  const leastS = Math.min(firstStepS * LEAST, gridS > 0 ? gridS * LEAST_OF_GRID : Infinity);
  return {
    baseS,
    firstLevel: Math.min(gridS > 0 ? -1 : 0, Math.floor(Math.log2(firstStepS / baseS))),
    leastLevel: Math.floor(Math.log2(leastS / baseS)),
  };
}

/** Size that no root exceeds, 1/s (Fujiwara 1916): within twice the degree of the fastest one. 0 for a constant. */
export function fastestRate(polynomial: readonly number[]): number {
  const p = trimmed(polynomial);
  const degree = p.length - 1;
  let largest = 0;
  for (let k = 1; k <= degree; k += 1)
    largest = Math.max(largest, Math.abs(p[k] / p[0] / (k === degree ? 2 : 1)) ** (1 / k));
  return 2 * largest;
}

/** Characteristic polynomial of the loop, its dead time left out. */
export function characteristic(plant: Plant, controller: IdealController): number[] {
  const { num, den } = openLoop(plant, controller);
  return trimmed(add(num, den));
}

/** Sizes that y and v are expected to exceed. */
export interface Floors {
  readonly yFloor: number;
  readonly vFloor: number;
}

export function floorsFor(plant: Plant, controller: IdealController, kind: StepKind): Floors {
  const { num, den } = plant;
  const staticGain = Math.abs(num[num.length - 1] / den[den.length - 1]) || Infinity;
  const size = Math.abs(controller.kp) || 1;
  return kind === 'setpoint'
    ? { yFloor: SMALL, vFloor: SMALL * size }
    : { yFloor: SMALL * Math.min(1 / size, staticGain), vFloor: SMALL };
}

/** Default of the back-calculation time constant: √(ti·td) with derivative, ti without. */
export function trackingTime({ ti, td }: IdealController, actuator: Actuator): number {
  return actuator.trackingTimeS ?? (td > 0 && Number.isFinite(ti) ? Math.sqrt(ti * td) : ti);
}
