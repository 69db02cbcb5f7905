import { multiply, trimmed } from './polynomial';
import type { IdealController, MeasurementFilter, Plant } from './types';

/** A rational function times dead time: num/den · e^(-deadTimeS·s), descending powers, not cancelled. */
export interface TransferFunction {
  readonly num: number[];
  readonly den: number[];
  readonly deadTimeS: number;
}

/**
 * Feedback part of the controller, Cy = kp·(1 + 1/(ti·s) + td·s/(1 + td·s/n)), as a rational function.
 *
 * Special cases: ti = Infinity has no integrator; td = 0 no derivative; n = Infinity the ideal derivative (improper);
 * kp = 0 is the zero controller, without an integrator that nothing reads.
 * @throws RangeError when ti, td or n is outside its range
 */
export function controllerTransfer(controller: IdealController): { num: number[]; den: number[] } {
  const { kp, ti, td, n } = controller;
  if (!Number.isFinite(kp)) throw new RangeError(`controller: kp must be finite, got ${kp}`);
  if (!(ti > 0))
    throw new RangeError(`controller: ti must be greater than 0 s (Infinity: no integral), got ${ti}`);
  if (!(td >= 0 && td < Infinity))
    throw new RangeError(`controller: td must be 0 s or more and finite, got ${td}`);
  if (td > 0 && !(n > 0)) throw new RangeError(`controller: n must be greater than 0, got ${n}`);
  if (kp === 0) return { num: [0], den: [1] };
  const lag = td > 0 ? td / n : 0;
  const withIntegral = Number.isFinite(ti);
  const num = withIntegral ? [kp * (lag + td), kp * (1 + lag / ti), kp / ti] : [kp * (lag + td), kp];
  const den = withIntegral ? [lag, 1, 0] : [lag, 1];
  return { num: trimmed(num), den: trimmed(den) };
}

/** Denominator of the measurement filter; [1] without one. */
export function filterDenominator(filter: MeasurementFilter | undefined): number[] {
  if (filter === undefined || filter.timeConstantS === 0) return [1];
  const { timeConstantS, order } = filter;
  if (!(timeConstantS > 0 && timeConstantS < Infinity))
    throw new RangeError(`filter: timeConstantS must be 0 s or more and finite, got ${timeConstantS}`);
  return order === 1 ? [timeConstantS, 1] : [timeConstantS ** 2 / 2, timeConstantS, 1];
}

/**
 * Loop transfer function L = Cy·G·F, dead time kept apart.
 *
 * @returns P, Q and the dead time of L = P/Q · e^(-deadTimeS·s); nothing is cancelled
 * @throws RangeError for a plant or controller outside its range, and for a loop with more zeros than poles
 */
export function openLoop(plant: Plant, controller: IdealController): TransferFunction {
  checkPlant(plant);
  const feedback = controllerTransfer(controller);
  const num = trimmed(multiply(plant.num, feedback.num));
  const den = trimmed(multiply(multiply(plant.den, feedback.den), filterDenominator(controller.filter)));
  if (num.length > den.length)
    throw new RangeError(
      'loop: more zeros than poles; an ideal derivative (n infinite) needs a plant with a lag',
    );
  return { num, den, deadTimeS: plant.deadTimeS };
}

/** The plant alone, without leading zero coefficients. @throws RangeError for a plant outside its range */
export function plantTransfer(plant: Plant): TransferFunction {
  checkPlant(plant);
  return { num: trimmed(plant.num), den: trimmed(plant.den), deadTimeS: plant.deadTimeS };
}

/** @throws RangeError for a plant that is improper, empty, not finite or with a negative dead time */
export function checkPlant(plant: Plant): void {
  const { num, den, deadTimeS } = plant;
  if (num.length === 0 || den.length === 0 || ![...num, ...den].every(Number.isFinite))
    throw new RangeError('plant: num and den need at least one coefficient each, all finite');
  if (den.every((c) => c === 0)) throw new RangeError('plant: den must not be zero');
  if (trimmed(num).length > trimmed(den).length)
    throw new RangeError('plant: the degree of num must not be higher than the degree of den');
  if (!(deadTimeS >= 0 && deadTimeS < Infinity))
    throw new RangeError(`plant: deadTimeS must be 0 s or more and finite, got ${deadTimeS}`);
}
