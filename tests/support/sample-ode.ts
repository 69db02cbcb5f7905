import type { SolvedResponse } from '../../lib/sim/ode/solve-loop';

/** Values and time derivatives of both signals at given times, in the units of the plant. */
export interface Samples {
  readonly y: Float64Array;
  readonly dy: Float64Array;
  readonly u: Float64Array;
  readonly du: Float64Array;
}

/** Reads a solved response at ascending times in seconds; where a signal jumps, the value after the jump. */
export function sampleAt(response: SolvedResponse, times: ArrayLike<number>): Samples {
  const { solution, timeUnitS, yUnit, uUnit } = response;
  const n = times.length;
  const samples = {
    y: new Float64Array(n),
    dy: new Float64Array(n),
    u: new Float64Array(n),
    du: new Float64Array(n),
  };
  let piece = 0;
  for (let i = 0; i < n; i += 1) {
    const x = times[i] / timeUnitS;
    while (piece < solution.count - 1 && x >= solution.to[piece]) piece += 1;
    const xi = solution.place(piece, x);
    const rate = 2 / ((solution.to[piece] - solution.from[piece]) * timeUnitS);
    samples.y[i] = yUnit * solution.y.value(piece, xi);
    samples.dy[i] = yUnit * rate * solution.y.slope(piece, xi);
    samples.u[i] = uUnit * solution.output.value(piece, xi);
    samples.du[i] = uUnit * rate * solution.output.slope(piece, xi);
  }
  return samples;
}
