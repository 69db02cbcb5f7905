import { roots } from '../roots';
import type { Plant } from '../types';
import { nelderMead } from './nelder-mead';
import { stepResponse } from './step-response';

const POINTS = 600;
/** The response is compared over this many time constants of its slowest pole. */
const TIME_CONSTANTS = 6;

export interface StepFit {
  /** Lags in seconds, largest first. */
  readonly lags: number[];
  readonly thetaS: number;
}

/** A stable plant's step response without its dead time, divided by its static gain, at 0, h, 2h … */
export interface UnitStep {
  readonly stepS: number;
  readonly y: Float64Array;
}

/** Samples the response of a stable plant with static gain until its slowest pole has died away. */
export function unitStep(plant: Plant, staticGain: number): UnitStep {
  const slowest = Math.min(...roots(plant.den).map((r) => -r.re));
  const stepS = TIME_CONSTANTS / slowest / (POINTS - 1);
  return { stepS, y: stepResponse(plant, stepS, POINTS).map((y) => y / staticGain) };
}

/**
 * Lags and dead time whose step response lies closest to the given one in the least-squares sense, the static gain
 * kept. The search starts from the area between the response and its final value (average residence time), cut in
 * different ways into lag and dead time.
 */
export function fitStep(target: UnitStep, order: 1 | 2): StepFit {
  const scale = Math.max(Math.abs(residenceTime(target)), 5 * target.stepS);
  const model = (point: readonly number[]): StepFit => ({
    lags: point.slice(1).map((x) => scale * Math.exp(x)),
    thetaS: scale * Math.abs(point[0]),
  });
  const cost = (point: readonly number[]): number => squaredError(target, model(point));
  const starts = [0.1, 0.4, 0.8].map((part) => [
    part,
    ...new Array<number>(order).fill(Math.log((1 - part) / order)),
  ]);
  if (order === 2) starts.forEach((s) => (s[2] -= 0.7));
  const found = starts.map((start) => nelderMead(cost, start, 0.3)).sort((p, q) => p.value - q.value)[0];
  const { lags, thetaS } = model(found.point);
  return { lags: lags.sort((a, b) => b - a), thetaS };
}

/** Area between the response and its final value: dead time plus lags of any model that keeps it. */
export function residenceTime({ y, stepS }: UnitStep): number {
  // Trapezia; the first and last ordinate count half.
  const inner = y.reduce((sum, value) => sum + 1 - value, 0);
  return stepS * (inner - (1 - y[0] + 1 - y[y.length - 1]) / 2);
}

/** Largest distance between the response and the model's, relative to the final value. */
export function largestError(target: UnitStep, model: StepFit, gainRatio = 1): number {
  return target.y.reduce(
    (worst, y, i) => Math.max(worst, Math.abs(y - gainRatio * lagStep(model, i * target.stepS))),
    0,
  );
}

function squaredError(target: UnitStep, model: StepFit): number {
  return target.y.reduce((sum, y, i) => sum + (y - lagStep(model, i * target.stepS)) ** 2, 0);
}

/** Unit step response of e^(−θs)/((τ1 s+1)(τ2 s+1)), or of one lag, or of none. */
function lagStep({ lags, thetaS }: StepFit, t: number): number {
  const after = t - thetaS;
  if (after < 0) return 0;
  const [tau1 = 0, tau2 = 0] = lags;
  if (tau1 === 0) return 1;
  if (tau2 === 0) return 1 - Math.exp(-after / tau1);
  const difference = tau1 - tau2;
  if (Math.abs(difference) < 1e-6 * tau1) return 1 - (1 + after / tau1) * Math.exp(-after / tau1);
  return 1 - (tau1 * Math.exp(-after / tau1) - tau2 * Math.exp(-after / tau2)) / difference;
}
