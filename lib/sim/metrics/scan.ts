import { Cubic } from './cubic';
import type { Trajectory } from './trajectory';

type Signal = 'y' | 'u';

const cubic = new Cubic();
const points = new Float64Array(2);

function load(trajectory: Trajectory, signal: Signal, index: number): number {
  const { t } = trajectory;
  const h = t[index + 1] - t[index];
  if (signal === 'y')
    cubic.fromEnds(
      h,
      trajectory.y0[index],
      trajectory.dy0[index],
      trajectory.y1[index],
      trajectory.dy1[index],
    );
  else
    cubic.fromEnds(
      h,
      trajectory.u0[index],
      trajectory.du0[index],
      trajectory.u1[index],
      trajectory.du1[index],
    );
  return h;
}

export interface Extreme {
  readonly value: number;
  /** First time at which it is reached, s. */
  readonly time: number;
}

/** The largest value of sign·y or sign·u (sign 0: of the magnitude, given back with its sign). */
export function extreme(trajectory: Trajectory, signal: Signal, sign: 1 | -1 | 0): Extreme {
  const { t, count } = trajectory;
  const start = signal === 'y' ? trajectory.y0 : trajectory.u0;
  const startSlope = signal === 'y' ? trajectory.dy0 : trajectory.du0;
  const end = signal === 'y' ? trajectory.y1 : trajectory.u1;
  const endSlope = signal === 'y' ? trajectory.dy1 : trajectory.du1;
  let best = Number.NEGATIVE_INFINITY;
  let value = 0;
  let time = 0;
  const take = (candidate: number, at: number) => {
    const size = sign === 0 ? Math.abs(candidate) : sign * candidate;
    // Equal peaks count once, at their first time; rounding must not make a later one higher.
    if (best === Number.NEGATIVE_INFINITY || size > best + 1e-12 * Math.abs(best)) {
      best = size;
      value = candidate;
      time = at;
    }
  };
  for (let i = 0; i < count; i += 1) {
    take(start[i], t[i]);
    if (startSlope[i] * endSlope[i] < 0) {
      const h = load(trajectory, signal, i);
      const found = cubic.stationary(points);
      for (let k = 0; k < found; k += 1) take(cubic.at(points[k]), t[i] + points[k] * h);
    }
    take(end[i], t[i + 1]);
  }
  return { value, time };
}

/** Sum of all that u moves: its first value, every jump, and the way between. */
export function totalVariation(trajectory: Trajectory): number {
  const { u0, u1, du0, du1, count } = trajectory;
  let sum = count > 0 ? Math.abs(u0[0]) : 0;
  for (let i = 0; i < count; i += 1) {
    if (i > 0) sum += Math.abs(u0[i] - u1[i - 1]);
    if (du0[i] * du1[i] >= 0) {
      sum += Math.abs(u1[i] - u0[i]);
      continue;
    }
    load(trajectory, 'u', i);
    const found = cubic.stationary(points);
    let last = u0[i];
    for (let k = 0; k < found; k += 1) {
      const value = cubic.at(points[k]);
      sum += Math.abs(value - last);
      last = value;
    }
    sum += Math.abs(u1[i] - last);
  }
  return sum;
}

/** First time at which sign·y reaches sign·level; the time of the jump where y jumps over it; null if never. */
export function firstReach(trajectory: Trajectory, level: number, sign: number): number | null {
  const { t, y0, y1, count } = trajectory;
  const there = (value: number) => sign * (value - level) >= 0;
  for (let i = 0; i < count; i += 1) {
    if (there(y0[i])) return t[i];
    if (there(y1[i])) {
      const h = load(trajectory, 'y', i);
      return t[i] + h * cubic.crossing(level, 0, 1);
    }
  }
  return null;
}

/** Last time at which |y − middle| > band; 0 if never, null if it is so at the very end. */
export function lastExit(trajectory: Trajectory, middle: number, band: number): number | null {
  const { t, y0, y1, dy0, dy1, count } = trajectory;
  const outside = (value: number) => Math.abs(value - middle) > band;
  if (count > 0 && outside(y1[count - 1])) return null;
  for (let i = count - 1; i >= 0; i -= 1) {
    if (i < count - 1 && outside(y1[i])) return t[i + 1];
    const startsOutside = outside(y0[i]);
    if (!startsOutside && dy0[i] * dy1[i] >= 0) continue;
    const h = load(trajectory, 'y', i);
    const found = cubic.stationary(points);
    let from = startsOutside ? 0 : -1;
    for (let k = 0; k < found; k += 1) if (outside(cubic.at(points[k]))) from = points[k];
    if (from < 0) continue;
    const level = middle + (cubic.at(from) > middle ? band : -band);
    // From the last place outside the curve runs into the band monotonically.
    return t[i] + h * cubic.crossing(level, from, 1);
  }
  return 0;
}

export interface ErrorIntegrals {
  readonly absolute: number;
  readonly squared: number;
  readonly timeAbsolute: number;
}

// Four-point Gauss rule on 0 to 1: exact for the square of a cubic.
const NODES = [0.06943184420297371, 0.33000947820757187, 0.6699905217924281, 0.9305681557970262];
const WEIGHTS = [0.17392742256872692, 0.32607257743127307, 0.32607257743127307, 0.17392742256872692];

/** ∫|e|, ∫e² and ∫t|e| of e = reference − y over the whole response, zeros of e located. */
export function errorIntegrals(trajectory: Trajectory, reference: number): ErrorIntegrals {
  const { t, y0, y1, count } = trajectory;
  let absolute = 0;
  let squared = 0;
  let timeAbsolute = 0;
  const part = (start: number, h: number, from: number, to: number) => {
    const width = to - from;
    for (let k = 0; k < 4; k += 1) {
      const x = from + width * NODES[k];
      const e = Math.abs(reference - cubic.at(x));
      const weight = WEIGHTS[k] * width * h;
      absolute += weight * e;
      squared += weight * e * e;
      timeAbsolute += weight * e * (start + x * h);
    }
  };
  for (let i = 0; i < count; i += 1) {
    const h = load(trajectory, 'y', i);
    const crosses = (reference - y0[i]) * (reference - y1[i]) < 0;
    if (!crosses) part(t[i], h, 0, 1);
    else {
      const zero = cubic.crossing(reference, 0, 1);
      part(t[i], h, 0, zero);
      part(t[i], h, zero, 1);
    }
  }
  return { absolute, squared, timeAbsolute };
}

/** y and u on the uniform grid t = i·horizonS/(n − 1); where a signal jumps, the value after the jump. */
export function resample(trajectory: Trajectory, horizonS: number, n: number) {
  const t = new Float64Array(n);
  for (let i = 0; i < n - 1; i += 1) t[i] = (i * horizonS) / (n - 1);
  t[n - 1] = horizonS;
  return { t, y: sampled(trajectory, 'y', t), u: sampled(trajectory, 'u', t) };
}

function sampled(trajectory: Trajectory, signal: Signal, times: Float64Array): Float64Array {
  const { t, count } = trajectory;
  const values = new Float64Array(times.length);
  let i = 0;
  for (let piece = 0; piece < count && i < times.length; piece += 1) {
    const end = piece === count - 1 ? Infinity : t[piece + 1];
    if (times[i] >= end) continue;
    const perPiece = 1 / load(trajectory, signal, piece);
    const { a, b, c, d } = cubic;
    const from = t[piece];
    for (; i < times.length && times[i] < end; i += 1) {
      const x = Math.min(1, Math.max(0, (times[i] - from) * perPiece));
      values[i] = a + x * (b + x * (c + x * d));
    }
  }
  return values;
}
