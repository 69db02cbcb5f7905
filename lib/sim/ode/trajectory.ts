import { Trajectory } from '../metrics';
import type { Signal } from './pieces';
import type { SolvedResponse } from './solve-loop';

/** Largest error of a cubic relative to the largest y, and to the largest output. */
const Y_ERROR = 2e-8;
const OUTPUT_ERROR = 2e-7;
const MOST_CUBICS = 64;
/** Places between the ends at which a cubic is compared with the polynomial, ξ from −1 to 1. */
const PROBES = [-0.6, 0, 0.6];

/**
 * Turns the solver's steps, polynomials of high degree, into the cubics that the metrics read: each step is cut into
 * as many equal parts as its own departure from a cubic asks for (the error falls with the fourth power).
 */
export function trajectoryOf(response: SolvedResponse, horizonS: number): Trajectory {
  const { solution, timeUnitS, yUnit, uUnit } = response;
  const { y, output, count, peak } = solution;
  const outputPeak = solution.outputPeak;
  const trajectory = new Trajectory(8 * count + 64);
  trajectory.t[0] = 0;
  for (let piece = 0; piece < count; piece += 1) {
    const from = solution.from[piece];
    const width = solution.to[piece] - from;
    const error = Math.max(
      cubicError(y, piece) / (Y_ERROR * peak || 1),
      cubicError(output, piece) / (OUTPUT_ERROR * outputPeak || 1),
    );
    const parts = Math.min(MOST_CUBICS, Math.max(1, Math.ceil(error ** 0.25)));
    const rate = 2 / (width * timeUnitS);
    for (let part = 0; part < parts; part += 1) {
      const last = piece === count - 1 && part === parts - 1;
      const i = trajectory.add(last ? horizonS : (from + (width * (part + 1)) / parts) * timeUnitS);
      const [xi0, xi1] = [-1 + (2 * part) / parts, -1 + (2 * (part + 1)) / parts];
      trajectory.y0[i] = yUnit * y.value(piece, xi0);
      trajectory.y1[i] = yUnit * y.value(piece, xi1);
      trajectory.dy0[i] = yUnit * rate * y.slope(piece, xi0);
      trajectory.dy1[i] = yUnit * rate * y.slope(piece, xi1);
      trajectory.u0[i] = uUnit * output.value(piece, xi0);
      trajectory.u1[i] = uUnit * output.value(piece, xi1);
      trajectory.du0[i] = uUnit * rate * output.slope(piece, xi0);
      trajectory.du1[i] = uUnit * rate * output.slope(piece, xi1);
    }
  }
  return trajectory;
}

/** How far the cubic with the same ends departs from the polynomial. */
function cubicError(signal: Signal, piece: number): number {
  const [y0, y1] = [signal.value(piece, -1), signal.value(piece, 1)];
  const [s0, s1] = [2 * signal.slope(piece, -1), 2 * signal.slope(piece, 1)];
  let worst = 0;
  for (const xi of PROBES) {
    const x = (1 + xi) / 2;
    const cubic = y0 + x * (s0 + x * (3 * (y1 - y0) - 2 * s0 - s1 + x * (2 * (y0 - y1) + s0 + s1)));
    worst = Math.max(worst, Math.abs(signal.value(piece, xi) - cubic));
  }
  return worst;
}
