/** Degree of the polynomials that stand for the solution between two steps of the solver. */
const DEGREE = 10;
const NODES = DEGREE + 1;

/** Chebyshev points of a step, from its start (0) to its end (1); both ends belong to them. */
export const NODE_FRACTIONS: readonly number[] = Array.from(
  { length: NODES },
  (_, j) => (1 - Math.cos((Math.PI * j) / DEGREE)) / 2,
);

/** Row k gives the coefficient of ξᵏ, ξ from −1 to 1, of the polynomial through values at the Chebyshev points. */
const FROM_VALUES: readonly Float64Array[] = powersFromNodeValues();

function powersFromNodeValues(): Float64Array[] {
  const chebyshev: number[][] = [[1], [0, 1]];
  for (let k = 2; k <= DEGREE; k += 1) {
    const doubled = [0, ...chebyshev[k - 1].map((c) => 2 * c)];
    chebyshev.push(doubled.map((c, power) => c - (chebyshev[k - 2][power] ?? 0)));
  }
  const half = (index: number) => (index === 0 || index === DEGREE ? 0.5 : 1);
  return Array.from({ length: NODES }, (_, power) =>
    Float64Array.from({ length: NODES }, (__, j) => {
      let sum = 0;
      for (let k = power; k <= DEGREE; k += 1) {
        // ξ at node j is −cos(πj/degree), hence T_k there is (−1)^k cos(πjk/degree).
        const atNode = (k % 2 === 0 ? 1 : -1) * Math.cos((Math.PI * j * k) / DEGREE);
        sum += (2 / DEGREE) * half(k) * half(j) * atNode * (chebyshev[k][power] ?? 0);
      }
      return sum;
    }),
  );
}

/**
 * One signal of the solution as polynomials, one for each step: copied out of the solver, because its own
 * interpolation is gone after the step, and needed as the history behind the dead time.
 */
export class Signal {
  private coefficients = new Float64Array(64 * NODES);
  private count = 0;

  /** Appends the polynomial through the values at the Chebyshev points of the next step. */
  append(values: ArrayLike<number>): void {
    const offset = this.count * NODES;
    if (offset + NODES > this.coefficients.length) {
      const larger = new Float64Array(2 * this.coefficients.length);
      larger.set(this.coefficients);
      this.coefficients = larger;
    }
    for (let power = 0; power < NODES; power += 1) {
      const row = FROM_VALUES[power];
      let sum = 0;
      for (let j = 0; j < NODES; j += 1) sum += row[j] * values[j];
      this.coefficients[offset + power] = sum;
    }
    this.count += 1;
  }

  /** Value in piece `index` at ξ, −1 at its start and 1 at its end. */
  value(index: number, xi: number): number {
    const c = this.coefficients;
    const first = index * NODES;
    let sum = c[first + DEGREE];
    for (let k = first + DEGREE - 1; k >= first; k -= 1) sum = sum * xi + c[k];
    return sum;
  }

  /** Derivative with respect to ξ. */
  slope(index: number, xi: number): number {
    const c = this.coefficients;
    const first = index * NODES;
    let sum = DEGREE * c[first + DEGREE];
    for (let k = DEGREE - 1; k >= 1; k -= 1) sum = sum * xi + k * c[first + k];
    return sum;
  }
}

/** The solution so far: the steps' ends in the dimensionless time, and y and the controller output on each step. */
export class Solution {
  readonly from: number[] = [];
  readonly to: number[] = [];
  readonly y = new Signal();
  readonly output = new Signal();
  /** Largest size of y and of the output at the Chebyshev points. */
  peak = 0;
  outputPeak = 0;

  get count(): number {
    return this.from.length;
  }

  append(from: number, to: number, y: ArrayLike<number>, output: ArrayLike<number>): void {
    this.from.push(from);
    this.to.push(to);
    this.y.append(y);
    this.output.append(output);
    for (let j = 0; j < NODES; j += 1) {
      this.peak = Math.max(this.peak, Math.abs(y[j]));
      this.outputPeak = Math.max(this.outputPeak, Math.abs(output[j]));
    }
  }

  /** Place of time x in piece `index` as ξ from −1 to 1. */
  place(index: number, x: number): number {
    const from = this.from[index];
    return (2 * (x - from)) / (this.to[index] - from) - 1;
  }
}
