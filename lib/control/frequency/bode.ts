import type { IdealController, Plant } from '../types';
import { limitGains } from '../margins/gain-margin';
import { lowPhase, loopCurve } from './curve';
import { unitGainCrossings } from './crossings';
import { scaledLoop, type ScaledLoop } from './scaled-loop';

export interface FrequencyResponse {
  readonly magnitude: Float64Array;
  /** Unwrapped: continuous in frequency, from -90° per integrator (and -180° for a negative gain) at low frequency. */
  readonly phaseDeg: Float64Array;
}

export interface BodeCurve extends FrequencyResponse {
  /** rad/s, ascending. */
  readonly omega: Float64Array;
}

const DECADE = 10;

/**
 * Magnitude and unwrapped phase of L = Cy·G·F with the exact dead time, or of the plant alone when controller is null.
 *
 * @param omegas frequencies in rad/s, ≥ 0, in any order; the phase is unwrapped whatever their spacing
 * Special cases: undamped poles and zeros turn the phase as if slightly damped; L = 0 has magnitude and phase 0.
 * @throws RangeError for a frequency that is negative or not finite, a plant or controller outside its range
 */
export function frequencyResponse(
  plant: Plant,
  controller: IdealController | null,
  omegas: ArrayLike<number>,
): FrequencyResponse {
  const magnitude = new Float64Array(omegas.length);
  const phaseDeg = new Float64Array(omegas.length);
  const loop = scaledLoop(plant, controller);
  for (let i = 0; i < omegas.length; i += 1) {
    const omega = omegas[i];
    if (!(omega >= 0 && omega < Infinity))
      throw new RangeError(`frequencyResponse: frequencies must be 0 rad/s or more and finite, got ${omega}`);
    if (loop === null) continue;
    const w = omega / loop.unitRadS;
    loop.evaluate(w);
    const ln = w === 0 && loop.originOrder !== 0 ? loop.originOrder * Infinity : loop.lnMagnitude;
    magnitude[i] = Math.exp(ln);
    phaseDeg[i] = ((unwrapped(loop, w) - loop.deadTime * w) * 180) / Math.PI;
  }
  return { magnitude, phaseDeg };
}

/** Phase without dead time: exact value from the polynomials, branch from the poles and zeros. */
function unwrapped(loop: ScaledLoop, w: number): number {
  let branch = lowPhase(loop);
  for (let i = 0; i < loop.rootRe.length; i += 1) {
    const re = loop.rootRe[i];
    const im = loop.rootIm[i];
    const side = re > 0 ? -loop.rootWeight[i] : loop.rootWeight[i];
    branch += side * (Math.atan2(w - im, Math.abs(re)) + Math.atan2(im, Math.abs(re)));
  }
  return loop.phase + 2 * Math.PI * Math.round((branch - loop.phase) / (2 * Math.PI));
}

/**
 * A frequency range to plot, in rad/s: from a decade below the lowest to a decade above the highest of the corner
 * frequencies, 1/dead time, the gain crossovers and the phase crossovers next to unit gain.
 */
export function bodeRange(plant: Plant, controller: IdealController | null): [number, number] {
  const loop = scaledLoop(plant, controller);
  if (loop === null) return controller === null ? [0.1, 10] : bodeRange(plant, null);
  const curve = loopCurve(loop);
  const limits = limitGains(curve);
  const marks = [
    ...Array.from(loop.rootRe, (re, i) => Math.hypot(re, loop.rootIm[i])),
    ...unitGainCrossings(curve).map(({ w }) => w),
    limits.above?.w ?? 0,
    limits.below?.w ?? 0,
    loop.deadTime > 0 ? 1 / loop.deadTime : 0,
  ].filter((w) => w > 0 && w < Infinity);
  if (marks.length === 0) marks.push(1);
  return [(Math.min(...marks) * loop.unitRadS) / DECADE, Math.max(...marks) * loop.unitRadS * DECADE];
}

/**
 * Curve of the loop (or of the plant alone) over bodeRange, ready to plot.
 *
 * @param points frequencies evenly spaced on the logarithmic axis; more are added where a lightly damped pole or zero
 * makes the curve narrow
 */
export function bodeCurve(plant: Plant, controller: IdealController | null, points = 400): BodeCurve {
  if (!(Number.isInteger(points) && points >= 2))
    throw new RangeError(`bodeCurve: points must be a whole number from 2, got ${points}`);
  const [low, high] = bodeRange(plant, controller);
  const ratio = Math.log(high / low) / (points - 1);
  const grid = Array.from({ length: points }, (_, i) =>
    i === points - 1 ? high : low * Math.exp(ratio * i),
  );
  const loop = scaledLoop(plant, controller);
  const own = loop === null ? [] : loopCurve(loop).nodes.map(({ w }) => w * loop.unitRadS);
  const omega = Float64Array.from([...grid, ...own.filter((w) => w > low && w < high)]).sort();
  return { omega, ...frequencyResponse(plant, controller, omega) };
}
