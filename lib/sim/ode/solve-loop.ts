import type { Actuator, IdealController, Plant } from '../../control/types';
import { ok, type Result } from '../../result';
import { integrateContinuous, type IntegrationRefusal } from './integrate';
import { integrateSampled } from './integrate-sampled';
import { LoopEquations, type Excitation } from './loop-equations';
import type { Solution } from './pieces';
import { plantStates } from './plant-states';
import { SampledLaw } from './sampled-law';

export interface OdeOptions {
  /** Length of the responses in seconds, > 0. */
  readonly horizonS: number;
  /** Points of the curves handed back, ≥ 2; 600 if not given. */
  readonly points?: number;
  readonly actuator?: Actuator;
  /** Given: the controller runs once per this time with zero-order hold. */
  readonly sampleTimeS?: number;
  /** Error of one step relative to the size of the response; 1e-8 if not given. */
  readonly tolerance?: number;
  /** Most work for one response, in evaluations of the equations; 2 million (some seconds) if not given. */
  readonly budget?: number;
}

/** A solved response: the solution in dimensionless time and signals, and what they are to be multiplied with. */
export interface SolvedResponse {
  readonly solution: Solution;
  readonly timeUnitS: number;
  readonly yUnit: number;
  readonly uUnit: number;
}

/** End of the response in the dimensionless time. */
export const END = 1000;

const DEFAULT_TOLERANCE = 1e-8;
const DEFAULT_BUDGET = 2e6;
/** A response smaller than this part of the assumed size is computed again with its own size as scale. */
const TOO_SMALL = 0.02;

/**
 * One response of the loop from rest: a unit step of the set-point, or of the load at the plant input.
 * The engine works in units of the response's own size, so that one tolerance suits every loop.
 */
export function solveLoop(
  plant: Plant,
  controller: IdealController,
  step: 'setpoint' | 'load',
  options: OdeOptions,
): Result<SolvedResponse, IntegrationRefusal> {
  // A load of one output unit moves the output by about one, hence y by about 1/kp.
  const assumed = step === 'setpoint' ? 1 : 1 / Math.abs(controller.kp);
  const first = solveInUnits(plant, controller, step, options, assumed);
  if (!first.ok) return first;
  const { peak } = first.value.solution;
  if (peak === 0 || peak > TOO_SMALL) return first;
  return solveInUnits(plant, controller, step, options, assumed * peak);
}

function solveInUnits(
  plant: Plant,
  controller: IdealController,
  step: 'setpoint' | 'load',
  options: OdeOptions,
  yUnit: number,
): Result<SolvedResponse, IntegrationRefusal> {
  const { kp, ti, td, n, filter } = controller;
  const {
    horizonS,
    actuator = {},
    sampleTimeS,
    tolerance = DEFAULT_TOLERANCE,
    budget = DEFAULT_BUDGET,
  } = options;
  const timeUnitS = horizonS / END;
  const uUnit = kp * yUnit;
  const limits = [(actuator.low ?? -Infinity) / uUnit, (actuator.high ?? Infinity) / uUnit].sort(
    (p, q) => p - q,
  );
  const excitation: Excitation = {
    setpoint: step === 'setpoint' ? 1 / yUnit : 0,
    load: step === 'load' ? 1 / uUnit : 0,
    low: limits[0],
    high: limits[1],
    slew: ((actuator.slew ?? Infinity) * timeUnitS) / Math.abs(uUnit),
  };
  const trackingTimeS = actuator.trackingTimeS ?? (td > 0 && Number.isFinite(ti) ? Math.sqrt(ti * td) : ti);
  const states = plantStates(plant, kp, timeUnitS);
  const delay = plant.deadTimeS / timeUnitS;
  // The derivative makes the error of y up to 1 + n times larger in the output, and the total variation adds it up over
  // every step; the solver's high order makes the smaller tolerance cheap.
  const ownTolerance = td > 0 ? tolerance / (10 * (1 + n)) : tolerance;
  const common = { end: END, delay, tolerance: ownTolerance, budget };
  const scales = { timeUnitS, yUnit, uUnit };
  if (sampleTimeS !== undefined) {
    const plantAlone = { ...controller, ti: Infinity, td: 0 };
    const unlimited = { ...excitation, low: -Infinity, high: Infinity, slew: Infinity };
    const equations = new LoopEquations(states, plantAlone, unlimited, true, timeUnitS, trackingTimeS);
    const law = new SampledLaw(controller, excitation, { sampleTimeS, timeUnitS, trackingTimeS });
    const solved = integrateSampled(equations, law, { ...common, sampleTime: sampleTimeS / timeUnitS });
    return solved.ok ? ok({ solution: solved.value, ...scales }) : solved;
  }
  const equations = new LoopEquations(states, controller, excitation, delay > 0, timeUnitS, trackingTimeS);
  const smoothing = states.relativeDegree + (filter?.order ?? 0);
  const solved = integrateContinuous(equations, { ...common, smoothing, margin: tolerance });
  return solved.ok ? ok({ solution: solved.value, ...scales }) : solved;
}
