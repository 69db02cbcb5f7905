import { filterDenominator, openLoop } from '../../control/loop';
import { add, trimmed } from '../../control/polynomial';
import { roots } from '../../control/roots';
import type { IdealController, Plant } from '../../control/types';
import { closedModel, balanced, loopModel } from './loop-model';
import { closedSpace, openSpace, type StateSpace } from './state-space';

export type StepKind = 'setpoint' | 'load';

/** A response that a run computes, with the lengths it begins with. */
export interface RunSetup {
  readonly space: StateSpace;
  /** Dead time between u and w, s; 0 where the loop is closed within the space. */
  readonly deadTimeS: number;
  /** Added to the delayed output. */
  readonly load: number;
  /** Steps are this times powers of two, s. With dead time they divide it or are multiples of it. */
  readonly baseS: number;
  /** A step that resolves the fastest motion the loop is capable of, s. */
  readonly firstStepS: number;
  /** Sizes that y and u are expected to exceed. */
  readonly yFloor: number;
  readonly uFloor: number;
}

/** Step times the fastest rate with which a run begins. */
const FIRST = 0.15;
/** Expected size of a response: this share of what the gains suggest. */
const SMALL = 0.02;

function fastest(polynomial: readonly number[]): number {
  const p = trimmed(polynomial);
  return p.length > 1 ? Math.max(...roots(p).map(({ re, im }) => Math.hypot(re, im))) : 0;
}

/** Closed-loop poles of a loop without dead time, rad/s. */
export function closedLoopPoles(plant: Plant, controller: IdealController): { re: number; im: number }[] {
  const { num, den } = openLoop(plant, controller);
  const characteristic = trimmed(add(num, den));
  return characteristic.length > 1 ? [...roots(characteristic)] : [];
}

/** The fastest rate in the loop cut open, 1/s: poles of plant and filter, and the derivative's lag. */
export function fastestOpenRate(plant: Plant, controller: IdealController): number {
  const { td, n, filter } = controller;
  return Math.max(fastest(plant.den), fastest(filterDenominator(filter)), td > 0 ? n / td : 0);
}

/** Sets up both responses of a linear loop. */
export function linearSetups(plant: Plant, controller: IdealController): Record<StepKind, RunSetup> {
  const { deadTimeS, num, den } = plant;
  const gain = Math.abs(num[num.length - 1] / den[den.length - 1]);
  const size = Math.abs(controller.kp) || 1;
  const open = loopModel(plant, controller, deadTimeS || 1);
  const closed = deadTimeS > 0 ? null : closedModel(open);
  const model = balanced(open, closed ? closed.a : open.a);
  const balancedClosed = closed ? closedModel(model) : null;
  const rate = closed
    ? Math.max(0, ...closedLoopPoles(plant, controller).map(({ re, im }) => Math.hypot(re, im)))
    : fastestOpenRate(plant, controller);
  const firstStepS = rate > 0 ? FIRST / rate : deadTimeS || 1;
  const baseS = deadTimeS || firstStepS;
  const setup = (kind: StepKind): RunSetup => {
    const r = kind === 'setpoint' ? 1 : 0;
    const load = 1 - r;
    return {
      space: balancedClosed ? closedSpace(model, balancedClosed, r, load) : openSpace(model, r),
      deadTimeS,
      load,
      baseS,
      firstStepS,
      yFloor: SMALL * (r === 1 ? 1 : Math.min(1 / size, gain > 0 ? gain : Infinity)),
      uFloor: SMALL * (r === 1 ? size : 1),
    };
  };
  return { setpoint: setup('setpoint'), load: setup('load') };
}
