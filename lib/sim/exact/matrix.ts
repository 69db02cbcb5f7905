/** Square matrices as flat arrays, row after row. */
export type Matrix = Float64Array;

export function multiplySquare(a: Matrix, b: Matrix, n: number): Matrix {
  const c = new Float64Array(n * n);
  for (let i = 0; i < n; i += 1)
    for (let k = 0; k < n; k += 1) {
      const factor = a[i * n + k];
      if (factor === 0) continue;
      for (let j = 0; j < n; j += 1) c[i * n + j] += factor * b[k * n + j];
    }
  return c;
}

function norm(a: Matrix, n: number): number {
  let largest = 0;
  for (let i = 0; i < n; i += 1) {
    let sum = 0;
    for (let j = 0; j < n; j += 1) sum += Math.abs(a[i * n + j]);
    largest = Math.max(largest, sum);
  }
  return largest;
}

const TERMS = 12;

/**
 * Matrix exponential by scaling and squaring: the Taylor series up to the 12th power of a matrix scaled to a norm of
 * at most 1/4, whose remainder is below 1e-17.
 */
export function exponential(a: Matrix, n: number): Matrix {
  const size = norm(a, n);
  const squarings = size > 0.25 ? Math.max(0, Math.ceil(Math.log2(size / 0.25))) : 0;
  const factor = 2 ** -squarings;
  const scaled = a.map((value) => value * factor);
  // Horner: I + A(I + A/2(I + A/3(…))).
  let sum = identity(n);
  for (let k = TERMS; k >= 1; k -= 1) {
    sum = multiplySquare(scaled, sum, n).map((value) => value / k);
    for (let i = 0; i < n; i += 1) sum[i * n + i] += 1;
  }
  for (let k = 0; k < squarings; k += 1) sum = multiplySquare(sum, sum, n);
  return sum;
}

export function identity(n: number): Matrix {
  const result = new Float64Array(n * n);
  for (let i = 0; i < n; i += 1) result[i * n + i] = 1;
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
