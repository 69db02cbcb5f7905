import { filterDenominator } from '../../control/loop';
import { trimmed } from '../../control/polynomial';
import type { Actuator, IdealController, Plant } from '../../control/types';
import { balanced, loopModel } from './loop-model';
import { characteristic, fastestRate, floorsFor, levelsFor, trackingTime } from './loop-scales';
import { Regime } from './regime';
import { closedSpace, EXCITATIONS, heldSpace, openSpace, type StepKind } from './spaces';
import type { StepperSettings } from './stepper';

/** What holds the controller output: nothing, or one of its limits. */
export type Mode = 'free' | 'low' | 'high';

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

/** Rates of plant, filter and derivative, 1/s: what the loop does between two echoes of its dead time. */
export function fastestOpenRate(plant: Plant, { td, n, filter }: IdealController): number {
  return Math.max(fastestRate(plant.den), fastestRate(filterDenominator(filter)), td > 0 ? n / td : 0);
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
    delayed ? 0 : fastestRate(characteristic(plant, controller)),
    delayed || limited ? fastestOpenRate(plant, controller) : 0,
    limited ? 1 / trackingTimeS : 0,
  ];
  const levels = levelsFor(Math.max(...rates), deadTimeS);
  const free = new Regime(delayed ? openSpace(model) : closedSpace(model), levels.baseS, deadTimeS);
  const common = { order: model.n, deadTimeS, ...levels };
  const limits = [low, high];
  const held = limited ? new Regime(heldSpace(model, limits, trackingTimeS, delayed), levels.baseS, 0) : null;
  return {
    deadTimeS,
    free,
    held,
    low,
    high,
    smoothing: trimmed(plant.den).length - trimmed(plant.num).length + (controller.filter?.order ?? 0),
    direct: Math.abs(model.v.w),
    settings: {
      setpoint: { ...common, load: 0, ...floorsFor(plant, controller, 'setpoint') },
      load: { ...common, load: 1, ...floorsFor(plant, controller, 'load') },
    },
  };
}

/** The constant input of a response in a mode: free regimes have one for each response, held ones one for each limit. */
export function constantOf(kind: StepKind, mode: Mode): number {
  const response = EXCITATIONS.findIndex((excitation) => excitation.kind === kind);
  return mode === 'free' ? response : 2 * response + (mode === 'low' ? 0 : 1);
}
