import { multiply } from '../polynomial';
import type { Plant } from '../types';
import { ok, refuse, type Result } from '../../result';
import { plantFactors, type PlantFactors } from './factors';
import { halfRule, type HalfRuleOptions } from './half-rule';
import { recognisePlant } from './recognise';
import { fitStep, largestError, residenceTime, unitStep } from './step-fit';

/**
 * fopdt: k·e^(−θs)/(τs+1) · sopdt: k·e^(−θs)/((τ1 s+1)(τ2 s+1)) · integrating: k·e^(−θs)/s ·
 * integrating-lag: k·e^(−θs)/(s(τ2 s+1)).
 */
export type ReductionTarget = 'fopdt' | 'sopdt' | 'integrating' | 'integrating-lag';

/** tau is the (larger) lag of fopdt and sopdt, tau2 the second lag of sopdt and the lag of integrating-lag. */
export interface ReducedModel {
  readonly k: number;
  readonly tau?: number;
  readonly tau2?: number;
  readonly thetaS: number;
}

export interface Reduction {
  readonly model: ReducedModel;
  readonly plant: Plant;
  readonly method: 'exact' | 'half rule' | 'step fit' | 'slow lag as integrator';
  /** Largest difference of the unit step responses relative to the final value; missing for integrating plants. */
  readonly error?: number;
}

export type ReductionRefusal =
  'UNSTABLE_PLANT' | 'INTEGRATING_PLANT' | 'NOT_INTEGRATING' | 'NO_LAG' | 'NO_STATIC_GAIN';

/** A lag this many times longer than the dead time acts like an integrator (Skogestad & Grimholt 2012). */
const SLOW_LAG = 8;

/**
 * The simple model that a tuning rule needs in place of a given plant.
 *
 * @param plant any proper plant
 * @param to the wanted model
 * @param options sample time and τc of the half rule
 * @returns a plant that already has the form as it is (`exact`); else, for real lags and real zeros, Skogestad's half
 *   rule; for complex poles or zeros, and where the numerator leaves the half rule nothing to work with, the
 *   least-squares fit of the exact step response with the static gain kept. `integrating` and `integrating-lag` of a
 *   plant whose lag is longer than 8 dead times take that lag as the integrator.
 * Refusals: UNSTABLE_PLANT; INTEGRATING_PLANT (asked for a static gain it has not, or more than one integrator);
 *   NOT_INTEGRATING; NO_LAG (a pure dead time or gain); NO_STATIC_GAIN (a zero at the origin).
 */
export function reducePlant(
  plant: Plant,
  to: ReductionTarget,
  options: HalfRuleOptions = {},
): Result<Reduction, ReductionRefusal> {
  const exact = options.sampleTimeS ? null : exactModel(plant, to);
  if (exact) return ok({ model: exact, plant: plantOf(exact, to), method: 'exact', error: 0 });
  const factors = plantFactors(plant);
  const obstacle = obstacleTo(factors, to);
  if (obstacle) return obstacle;
  if (to === 'fopdt' || to === 'sopdt') return ok(withStaticGain(plant, factors, to, options));
  return factors.integrators === 1
    ? ok(integratingModel(plant, factors, to, options))
    : slowLagAsIntegrator(plant, to, options);
}

function exactModel(plant: Plant, to: ReductionTarget): ReducedModel | null {
  const found = recognisePlant(plant);
  if (to === 'fopdt' && found.shape === 'first-order')
    return { k: found.k, tau: found.tau, thetaS: found.theta };
  if (to === 'sopdt' && found.shape === 'second-order-real') {
    return { k: found.k, tau: found.tau1, tau2: found.tau2, thetaS: found.theta };
  }
  if (to === 'sopdt' && found.shape === 'first-order') {
    return { k: found.k, tau: found.tau, tau2: 0, thetaS: found.theta };
  }
  if (to === 'integrating' && found.shape === 'integrator') return { k: found.k, thetaS: found.theta };
  if (to === 'integrating-lag' && found.shape === 'integrator-lag') {
    return { k: found.k, tau2: found.tau, thetaS: found.theta };
  }
  if (to === 'integrating-lag' && found.shape === 'integrator')
    return { k: found.k, tau2: 0, thetaS: found.theta };
  return null;
}

function obstacleTo(
  factors: PlantFactors,
  to: ReductionTarget,
): ReturnType<typeof refuse<ReductionRefusal>> | null {
  const integrating = to === 'integrating' || to === 'integrating-lag';
  if (factors.unstable) {
    return refuse('UNSTABLE_PLANT', 'The plant is unstable or undamped; no stable model stands for it.');
  }
  if (factors.zeroStaticGain)
    return refuse('NO_STATIC_GAIN', 'The plant has a zero at the origin: its static gain is 0.');
  if (factors.integrators > (integrating ? 1 : 0)) {
    const count = factors.integrators === 1 ? 'an integrator' : `${factors.integrators} integrators`;
    return refuse('INTEGRATING_PLANT', `The plant has ${count}; ${to} has ${integrating ? 'one' : 'none'}.`);
  }
  if (factors.integrators === 0 && factors.lags.length === 0 && !factors.complexPoles) {
    return refuse(
      'NO_LAG',
      'The plant is a gain with dead time only; it has no lag that a model could keep.',
    );
  }
  return null;
}

function withStaticGain(
  plant: Plant,
  factors: PlantFactors,
  to: 'fopdt' | 'sopdt',
  options: HalfRuleOptions,
): Reduction {
  const order = to === 'fopdt' ? 1 : 2;
  const target = unitStep(plant, factors.k);
  const half = halfRuleOrNull(plant, factors, order, options);
  const fit = half === null ? fitStep(target, order) : null;
  const lags = (half ?? fit)?.lags ?? [];
  const k = half?.k ?? factors.k;
  const thetaS = half?.thetaS ?? plant.deadTimeS + (options.sampleTimeS ?? 0) / 2 + (fit?.thetaS ?? 0);
  const model = { k, tau: lags[0], ...(order === 2 ? { tau2: lags[1] ?? 0 } : {}), thetaS };
  return {
    model,
    plant: plantOf(model, to),
    method: half === null ? 'step fit' : 'half rule',
    error: largestError(target, { lags: [...lags], thetaS: thetaS - plant.deadTimeS }, k / factors.k),
  };
}

function integratingModel(
  plant: Plant,
  factors: PlantFactors,
  to: 'integrating' | 'integrating-lag',
  options: HalfRuleOptions,
): Reduction {
  const order = to === 'integrating' ? 1 : 2;
  const half = halfRuleOrNull(plant, factors, order, options);
  if (half !== null) {
    const model = { k: half.k, ...(order === 2 ? { tau2: half.lags[0] ?? 0 } : {}), thetaS: half.thetaS };
    return { model, plant: plantOf(model, to), method: 'half rule' };
  }
  // What follows the integrator has a static gain; fitting its step response keeps the final ramp where it is.
  const rest = unitStep(behindIntegrator(plant), factors.k);
  const fit = to === 'integrating' ? { lags: [], thetaS: residenceTime(rest) } : fitStep(rest, 1);
  const thetaS = Math.max(0, plant.deadTimeS + (options.sampleTimeS ?? 0) / 2 + fit.thetaS);
  const model = { k: factors.k, ...(order === 2 ? { tau2: fit.lags[0] } : {}), thetaS };
  return { model, plant: plantOf(model, to), method: 'step fit' };
}

function slowLagAsIntegrator(
  plant: Plant,
  to: 'integrating' | 'integrating-lag',
  options: HalfRuleOptions,
): Result<Reduction, ReductionRefusal> {
  const reduced = reducePlant(plant, to === 'integrating' ? 'fopdt' : 'sopdt', options);
  if (!reduced.ok) return reduced;
  const { k, tau = 0, tau2, thetaS } = reduced.value.model;
  if (tau < SLOW_LAG * thetaS) {
    return refuse(
      'NOT_INTEGRATING',
      `The plant's lag of ${tau.toPrecision(3)} s is shorter than ${SLOW_LAG} dead times (${thetaS.toPrecision(3)} s each), ` +
        'so it does not act like an integrator.',
    );
  }
  const model = { k: k / tau, ...(tau2 === undefined ? {} : { tau2 }), thetaS };
  return ok({ model, plant: plantOf(model, to), method: 'slow lag as integrator' });
}

/** The plant without its one integrator (and without factors s common to numerator and denominator). */
function behindIntegrator({ num, den, deadTimeS }: Plant): Plant {
  const common = num.length - 1 - num.findLastIndex((c) => c !== 0);
  return { num: num.slice(0, num.length - common), den: den.slice(0, den.length - common - 1), deadTimeS };
}

/** The half rule where it applies: real factors, and lags left to keep. */
function halfRuleOrNull(plant: Plant, factors: PlantFactors, order: 1 | 2, options: HalfRuleOptions) {
  if (factors.complexPoles || factors.complexZeros) return null;
  const half = halfRule(factors, plant.deadTimeS, order, options);
  return half === null || half.lags.length + factors.integrators === 0 ? null : half;
}

function plantOf({ k, tau = 0, tau2 = 0, thetaS }: ReducedModel, to: ReductionTarget): Plant {
  const integrating = to === 'integrating' || to === 'integrating-lag';
  const factors = [
    ...(tau > 0 ? [[tau, 1]] : []),
    ...(tau2 > 0 ? [[tau2, 1]] : []),
    ...(integrating ? [[1, 0]] : []),
  ];
  return { num: [k], den: factors.reduce((p, q) => multiply(p, q), [1]), deadTimeS: thetaS };
}
