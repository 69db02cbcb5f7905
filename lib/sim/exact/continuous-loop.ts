import { filterDenominator, openLoop } from '../../control/loop';
import { add, trimmed } from '../../control/polynomial';
import { roots } from '../../control/roots';
import type { Actuator, IdealController, Plant } from '../../control/types';
import { balanced, loopModel, type LoopModel } from './loop-model';
import { Regime } from './regime';
import { closedSpace, EXCITATIONS, heldSpace, openSpace, type StepKind } from './spaces';
import type { StepperSettings } from './stepper';

/** Step times the fastest rate with which a run begins. */
const FIRST = 0.15;
/** No step is shorter than this share of the first one, or of the dead time. */
const LEAST = 1 / 16;
const LEAST_OF_DEAD_TIME = 1 / 256;
/** Expected size of a response: this share of what the gains suggest. */
const SMALL = 0.02;

/** A loop with a continuous controller, prepared for both of its responses. */
export interface ContinuousLoop {
  readonly deadTimeS: number;
  readonly free: Regime;
  /** While the output is held at a limit; null without limits. */
  readonly held: Regime | null;
  readonly low: number;
  readonly high: number;
  /** By how many derivatives a jump of the output is smoothed on its way through plant and filter. */
  readonly smoothing: number;
  /** Size of the loop's gain at infinite frequency. */
  readonly direct: number;
  readonly settings: Readonly<Record<StepKind, StepperSettings>>;
}

/** Default of the back-calculation time constant: √(ti·td) with derivative, ti without. */
export function trackingTime({ ti, td }: IdealController, actuator: Actuator): number {
  return actuator.trackingTimeS ?? (td > 0 && Number.isFinite(ti) ? Math.sqrt(ti * td) : ti);
}

function fastest(polynomial: readonly number[]): number {
  const p = trimmed(polynomial);
  return p.length > 1 ? Math.max(...roots(p).map(({ re, im }) => Math.hypot(re, im))) : 0;
}

/** Characteristic polynomial of the loop, its dead time left out. */
export function characteristic(plant: Plant, controller: IdealController): number[] {
  const { num, den } = openLoop(plant, controller);
  return trimmed(add(num, den));
}

/** Length of the levels, the first and the lowest level for motions of a rate (1/s). */
export function levelsFor(rate: number, deadTimeS: number) {
  const firstStepS = rate > 0 ? FIRST / rate : deadTimeS || 1;
  const baseS = deadTimeS || firstStepS;
  const leastS = Math.min(firstStepS * LEAST, deadTimeS > 0 ? deadTimeS * LEAST_OF_DEAD_TIME : Infinity);
  return {
    baseS,
    firstLevel: Math.min(deadTimeS > 0 ? -1 : 0, Math.floor(Math.log2(firstStepS / baseS))),
    leastLevel: Math.floor(Math.log2(leastS / baseS)),
  };
}

/** Rates of plant, filter and derivative, 1/s: what the loop does between two echoes of its dead time. */
export function fastestOpenRate(plant: Plant, { td, n, filter }: IdealController): number {
  return Math.max(fastest(plant.den), fastest(filterDenominator(filter)), td > 0 ? n / td : 0);
}

function settingsFor(
  plant: Plant,
  controller: IdealController,
  model: LoopModel,
  levels: ReturnType<typeof levelsFor>,
): Record<StepKind, StepperSettings> {
  const { num, den, deadTimeS } = plant;
  const staticGain = Math.abs(num[num.length - 1] / den[den.length - 1]) || Infinity;
  const size = Math.abs(controller.kp) || 1;
  const common = { order: model.n, deadTimeS, ...levels };
  return {
    setpoint: { ...common, load: 0, yFloor: SMALL, vFloor: SMALL * size },
    load: { ...common, load: 1, yFloor: SMALL * Math.min(1 / size, staticGain), vFloor: SMALL },
  };
}

/** Prepares a loop for its responses; what both share is made once. */
export function continuousLoop(
  plant: Plant,
  controller: IdealController,
  actuator: Actuator = {},
): ContinuousLoop {
  const { deadTimeS } = plant;
  const { low = -Infinity, high = Infinity } = actuator;
  const limited = low > -Infinity || high < Infinity;
  const delayed = deadTimeS > 0;
  const trackingTimeS = trackingTime(controller, actuator);
  const unbalanced = loopModel(plant, controller, deadTimeS || 1);
  const model = balanced(unbalanced, delayed ? unbalanced.a : closedSpace(unbalanced).a);
  const rates = [
    delayed ? 0 : fastest(characteristic(plant, controller)),
    delayed || limited ? fastestOpenRate(plant, controller) : 0,
    limited ? 1 / trackingTimeS : 0,
  ];
  const levels = levelsFor(Math.max(...rates), deadTimeS);
  const { baseS, leastLevel } = levels;
  const free = new Regime(delayed ? openSpace(model) : closedSpace(model), baseS, leastLevel, deadTimeS);
  const limits = [low, high];
  const held = limited
    ? new Regime(heldSpace(model, limits, trackingTimeS, delayed), baseS, leastLevel, 0)
    : null;
  return {
    deadTimeS,
    free,
    held,
    low,
    high,
    smoothing: trimmed(plant.den).length - trimmed(plant.num).length + (controller.filter?.order ?? 0),
    direct: Math.abs(model.v.w),
    settings: settingsFor(plant, controller, model, levels),
  };
}

/** The constant input of a response in the free regime, and of a limit (0 low, 1 high) in the held one. */
export function constantOf(kind: StepKind, limit?: 0 | 1): number {
  const response = EXCITATIONS.findIndex((excitation) => excitation.kind === kind);
  return limit === undefined ? response : 2 * response + limit;
}
