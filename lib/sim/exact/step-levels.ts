import { norm, SMALL_NORM, smallExponential } from './matrix';
import { columnsOf, POWERS, type Propagator, type StateSpace } from './state-space';

/**
 * Propagators of one system over the lengths base·2^level. Up to the length over which a series converges at once each
 * has its own: built up from shorter ones it would lose the digits in which they differ from the identity. Beyond it
 * each is made of the one below, so that steps of many lengths cost little more than one.
 */
export class StepLevels {
  private readonly known = new Map<number, Propagator>();
  private readonly rate: number;

  /** @param baseS length of level 0, s */
  constructor(
    private readonly space: StateSpace,
    private readonly baseS: number,
  ) {
    this.rate = norm(space.a, space.n) / space.timeUnitS;
  }

  at(level: number): Propagator {
    const found = this.known.get(level);
    if (found) return found;
    const lengthS = this.baseS * 2 ** level;
    const small = lengthS * this.rate <= SMALL_NORM;
    const result = small ? series(this.space, lengthS) : doubled(this.space, this.at(level - 1));
    this.known.set(level, result);
    return result;
  }

  /** A propagator of any length. */
  over(lengthS: number): Propagator {
    const doublings = Math.max(0, Math.ceil(Math.log2((lengthS * this.rate) / SMALL_NORM)));
    let result = series(this.space, lengthS / 2 ** doublings);
    for (let i = 0; i < doublings; i += 1) result = doubled(this.space, result);
    return result;
  }
}

/** Terms that a Taylor series needs for a length over which the system moves little. */
const TERMS = 12;

function series(space: StateSpace, lengthS: number): Propagator {
  const { n, a, bw, constants, timeUnitS } = space;
  const { stride, powers } = columnsOf(space);
  const length = lengthS / timeUnitS;
  const scaled = a.map((value) => value * length);
  const phi = smallExponential(scaled, n);
  const block = new Float64Array(n * stride);
  for (let i = 0; i < n; i += 1) for (let j = 0; j < n; j += 1) block[i * stride + j] = phi[i * n + j];
  if (bw) {
    // The response to w^(k) is Σ A^i·bw·h^(i+k+1)/(i+k+1)!.
    let column = bw;
    let factorial = 1;
    for (let i = 0; i <= TERMS; i += 1) {
      factorial *= i || 1;
      let factor = 1 / factorial;
      for (let k = 0; k < POWERS; k += 1) {
        factor *= length / (i + k + 1);
        for (let row = 0; row < n; row += 1) block[row * stride + n + k] += factor * column[row];
      }
      column = times(scaled, column, n);
    }
  }
  constants.forEach((e, c) => {
    let column = e;
    let factor = 1;
    for (let i = 0; i <= TERMS; i += 1) {
      factor *= i === 0 ? length : 1 / (i + 1);
      for (let row = 0; row < n; row += 1) block[row * stride + n + powers + c] += factor * column[row];
      column = times(scaled, column, n);
    }
  });
  return { lengthS, block };
}

function times(a: Float64Array, vector: Float64Array, n: number): Float64Array {
  const result = new Float64Array(n);
  for (let i = 0; i < n; i += 1) {
    let sum = 0;
    for (let j = 0; j < n; j += 1) sum += a[i * n + j] * vector[j];
    result[i] = sum;
  }
  return result;
}

/**
 * Two steps in one: the second half goes on from the end of the first, and sees the derivatives of w as they have
 * become: w^(j)(h) = Σ w^(k)·h^(k−j)/(k−j)!.
 */
function doubled(space: StateSpace, { lengthS, block: one }: Propagator): Propagator {
  const { n, timeUnitS } = space;
  const { stride, powers } = columnsOf(space);
  const length = lengthS / timeUnitS;
  const block = new Float64Array(n * stride);
  for (let i = 0; i < n; i += 1) {
    const at = i * stride;
    for (let j = 0; j < n; j += 1) {
      const factor = one[at + j];
      if (factor === 0) continue;
      for (let k = 0, from = j * stride; k < stride; k += 1) block[at + k] += factor * one[from + k];
    }
    for (let k = 0; k < powers; k += 1) {
      let factor = 1;
      for (let j = k; j >= 0; j -= 1) {
        block[at + n + k] += factor * one[at + n + j];
        factor *= length / (k - j + 1);
      }
    }
    for (let k = n + powers; k < stride; k += 1) block[at + k] += one[at + k];
  }
  return { lengthS: 2 * lengthS, block };
}
