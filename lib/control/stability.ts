import { lnMagnitudeAtInfinity, loopCurve } from './frequency/curve';
import { STARTS_ON_ONE, unitGainCrossings } from './frequency/crossings';
import { loopFactors } from './frequency/loop-factors';
import { ScaledLoop } from './frequency/scaled-loop';
import { openLoop, type TransferFunction } from './loop';
import { add } from './polynomial';
import type { ComplexNumber } from './roots';
import { isHurwitz } from './stability/hurwitz';
import type { IdealController, Plant } from './types';

export { isHurwitz } from './stability/hurwitz';

/** A gain crossover whose L is this near to -1 lies on the stability limit, to rounding. */
const ON_LIMIT = 1e-12;
/** 1 + L(0) this small is 0 to rounding: a closed-loop pole lies at the origin. */
const CANCELS = 1e-13;

/**
 * Is the closed loop stable: no zero of Q + P·e^(-deadTimeS·s) in Re s ≥ 0, for L = P/Q · e^(-deadTimeS·s)?
 *
 * Without dead time by Routh's array on P + Q; 1 + L(∞) ≤ 0 counts as unstable. With dead time by Nyquist's count;
 * a loop with |L(∞)| ≥ 1 has infinitely many unstable poles. Modes that cancel in L count: a pole in Re s ≥ 0 that the
 * controller cancels leaves the loop unstable.
 * @throws RangeError for a plant or controller outside its range
 */
export function isStable(plant: Plant, controller: IdealController): boolean {
  const transfer = openLoop(plant, controller);
  const byPolynomial = stableByPolynomial(transfer);
  if (byPolynomial !== null) return byPolynomial;
  const loop = new ScaledLoop(transfer, loopFactors(plant, controller));
  return stableByCount(loop, unitGainCrossings(loopCurve(loop)));
}

/** The answer where no count is needed: no dead time, a loop gain that does not fall off, or a root at the origin. */
export function stableByPolynomial({ num, den, deadTimeS }: TransferFunction): boolean | null {
  const closed = add(den, num);
  const last = closed.length - 1;
  if (Math.abs(closed[last]) <= CANCELS * Math.abs(den[den.length - 1])) return false;
  const gainAtInfinity = num.length === den.length ? num[0] / den[0] : 0;
  if (deadTimeS === 0) return 1 + gainAtInfinity > 0 && isHurwitz(closed);
  if (num.every((c) => c === 0)) return isHurwitz(den);
  return Math.abs(gainAtInfinity) >= 1 ? false : null;
}

/**
 * Nyquist's count from the gain crossovers alone. F = Q + P·e^(-θs) has no zero on the right when its phase turns by
 * n·90° from w = 0 to infinity (n poles in all). Where |L| < 1 the phase of F turns like that of Q, where |L| > 1 like
 * that of P·e^(-θs), up to the phases of 1 + L and 1 + 1/L, which stay within ±90° and jump at each crossover.
 * Poles on the axis lie where P counts and zeros on the axis where Q counts, so that neither needs a detour.
 */
export function stableByCount(loop: ScaledLoop, crossings: readonly { w: number; phase: number }[]): boolean {
  const { zeros, poles } = loop.factors;
  let aboveOne = startsAboveOne(loop, crossings.length);
  let turn = 0;
  let from = 0;
  for (const { w, phase } of [...crossings, { w: Infinity, phase: 0 }]) {
    const to = w * loop.unitRadS;
    const delayTurn = loop.deadTime > 0 ? loop.deadTime * (w - from / loop.unitRadS) : 0;
    turn += aboveOne ? turnOf(zeros, from, to) - delayTurn : turnOf(poles, from, to);
    if (w === Infinity) break;
    const lag = principal(phase);
    if (Math.PI - Math.abs(lag) < ON_LIMIT) return false;
    turn += aboveOne ? -lag : lag;
    aboveOne = !aboveOne;
    from = to;
  }
  return Math.round(turn / (Math.PI / 2)) === poles.length;
}

/** Is |L| above 1 just after w = 0? Where L(0) is 1 to rounding, told from the other end by the number of crossovers. */
function startsAboveOne(loop: ScaledLoop, crossings: number): boolean {
  if (loop.originOrder !== 0) return loop.originOrder > 0;
  if (Math.abs(loop.lnLowGain) > STARTS_ON_ONE) return loop.lnLowGain > 0;
  return lnMagnitudeAtInfinity(loop) > 0 !== (crossings % 2 === 1);
}

/** By how much the product of (jw - root) turns between two frequencies. */
function turnOf(list: readonly ComplexNumber[], from: number, to: number): number {
  let turn = 0;
  for (const { re, im } of list) {
    if (re === 0 && im === 0) continue;
    const side = re > 0 ? -1 : 1;
    turn += side * (Math.atan2(to - im, Math.abs(re)) - Math.atan2(from - im, Math.abs(re)));
  }
  return turn;
}

/** The phase in (-π, π]. */
function principal(phase: number): number {
  return phase - 2 * Math.PI * Math.ceil((phase - Math.PI) / (2 * Math.PI));
}
