import { trimmed } from '../polynomial';
import type { Plant } from '../types';

/**
 * Exact unit step response of the plant without its dead time at 0, h, 2h … (n points), by the matrix exponential of
 * the companion form. Time is counted in units of the poles' geometric mean, which keeps the coefficients near 1.
 */
export function stepResponse(plant: Pick<Plant, 'num' | 'den'>, stepS: number, points: number): Float64Array {
  const den = trimmed(plant.den);
  const order = den.length - 1;
  const num = [...new Array<number>(den.length - trimmed(plant.num).length).fill(0), ...trimmed(plant.num)];
  const frequency = frequencyScale(den);
  const a = den.map((c, i) => c / den[0] / frequency ** i);
  const b = num.map((c, i) => c / den[0] / frequency ** i);
  // Observer form x' = A x + (b − b0·a) u, y = x1 + b0 u; the constant input is one more state.
  const size = order + 1;
  const matrix = Array.from({ length: size }, () => new Float64Array(size));
  for (let i = 0; i < order; i += 1) {
    matrix[i][0] -= a[i + 1];
    if (i + 1 < order) matrix[i][i + 1] += 1;
    matrix[i][order] += b[i + 1] - b[0] * a[i + 1];
  }
  const transition = exponential(matrix, stepS * frequency);
  let state = new Float64Array(size);
  state[order] = 1;
  return Float64Array.from({ length: points }, () => {
    const y = (order > 0 ? state[0] : 0) + b[0];
    state = Float64Array.from(transition, (row) => row.reduce((sum, c, j) => sum + c * state[j], 0));
    return y;
  });
}

function frequencyScale(den: readonly number[]): number {
  let last = den.length - 1;
  while (last > 0 && den[last] === 0) last -= 1;
  return last === 0 ? 1 : Math.abs(den[last] / den[0]) ** (1 / last);
}

/** e^(matrix·t) by a Taylor series on t/2^m and m squarings. */
function exponential(matrix: readonly Float64Array[], t: number): Float64Array[] {
  const size = matrix.length;
  const norm = Math.max(...matrix.map((row) => row.reduce((sum, c) => sum + Math.abs(c), 0))) * t;
  const squarings = Math.max(0, Math.ceil(Math.log2(norm)) + 2);
  const small = matrix.map((row) => row.map((c) => (c * t) / 2 ** squarings));
  const identity = matrix.map((_, i) => Float64Array.from({ length: size }, (__, j) => (i === j ? 1 : 0)));
  let sum: Float64Array[] = identity;
  for (let k = 12; k >= 1; k -= 1) {
    sum = product(small, sum).map((row, i) => row.map((c, j) => identity[i][j] + c / k));
  }
  for (let i = 0; i < squarings; i += 1) sum = product(sum, sum);
  return sum;
}

function product(p: readonly Float64Array[], q: readonly Float64Array[]): Float64Array[] {
  return p.map((row) =>
    Float64Array.from({ length: q.length }, (_, j) => row.reduce((sum, c, k) => sum + c * q[k][j], 0)),
  );
}
