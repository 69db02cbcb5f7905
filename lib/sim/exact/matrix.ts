/** Square matrices as flat arrays, row after row. */
export type Matrix = Float64Array;

export function multiplySquare(a: Matrix, b: Matrix, n: number): Matrix {
  const c = new Float64Array(n * n);
  for (let i = 0; i < n; i += 1) {
    const row = i * n;
    for (let k = 0; k < n; k += 1) {
      const factor = a[row + k];
      if (factor === 0) continue;
      for (let j = 0, at = k * n; j < n; j += 1, at += 1) c[row + j] += factor * b[at];
    }
  }
  return c;
}

/** Largest row sum. */
export function norm(a: Matrix, n: number): number {
  let largest = 0;
  for (let i = 0; i < n; i += 1) {
    let sum = 0;
    for (let j = 0; j < n; j += 1) sum += Math.abs(a[i * n + j]);
    largest = Math.max(largest, sum);
  }
  return largest;
}

/** Largest norm for which the series of `smallExponential` leaves a remainder below 1e-16. */
export const SMALL_NORM = 0.3;

/** 1/k! for k = 0 … 12. */
const FACTORS = Array.from({ length: 13 }, (_, k) => {
  let factor = 1;
  for (let i = 2; i <= k; i += 1) factor /= i;
  return factor;
});

/**
 * Matrix exponential of a matrix whose norm is at most SMALL_NORM: the Taylor series up to the 12th power, grouped
 * by cubes so that it takes five products (Paterson and Stockmeyer, SIAM J. Comput. 2 (1973) 60-66).
 */
export function smallExponential(a: Matrix, n: number): Matrix {
  const a2 = multiplySquare(a, a, n);
  const a3 = multiplySquare(a2, a, n);
  const sum = new Float64Array(n * n);
  for (let i = 0; i < sum.length; i += 1) sum[i] = FACTORS[12] * a3[i];
  let result: Matrix = sum;
  for (let group = 3; group >= 0; group -= 1) {
    const [f0, f1, f2] = [FACTORS[3 * group], FACTORS[3 * group + 1], FACTORS[3 * group + 2]];
    for (let i = 0; i < result.length; i += 1) result[i] += f1 * a[i] + f2 * a2[i];
    for (let i = 0; i < n; i += 1) result[i * n + i] += f0;
    if (group > 0) result = multiplySquare(result, a3, n);
  }
  return result;
}

/**
 * Powers of two d such that D⁻¹AD has rows and columns of about equal size (Parlett and Reinsch, Numer. Math. 13
 * (1969) 293–304): coefficients of very different sizes would cost the exponential its digits.
 */
export function balancing(a: Matrix, n: number): Float64Array {
  const d = new Float64Array(n).fill(1);
  for (let round = 0, changed = true; changed && round < 60; round += 1) {
    changed = false;
    for (let i = 0; i < n; i += 1) {
      let column = 0;
      let row = 0;
      for (let j = 0; j < n; j += 1) {
        if (j === i) continue;
        column += (Math.abs(a[j * n + i]) * d[i]) / d[j];
        row += (Math.abs(a[i * n + j]) * d[j]) / d[i];
      }
      if (column === 0 || row === 0) continue;
      const power = Math.round(Math.log2(row / column) / 2);
      if (power === 0) continue;
      d[i] *= 2 ** power;
      changed = true;
    }
  }
  return d;
}
