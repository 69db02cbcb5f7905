import { multiplySquare, norm, SMALL_NORM, smallExponential } from './matrix';
import { POWERS, type Propagator, type StateSpace } from './state-space';

/**
 * Propagators of one system over the lengths base·2^level: each is made of the one below, so that steps of many
 * lengths cost little more than one.
 */
export class StepLevels {
  private readonly known = new Map<number, Propagator>();
  private readonly rate: number;

  /** @param baseS length of level 0, s; @param lowestLevel the level that the others are usually built upon */
  constructor(
    private readonly space: StateSpace,
    private readonly baseS: number,
    private readonly lowestLevel: number,
  ) {
    this.rate = norm(space.a, space.n) / space.timeUnitS;
  }

  at(level: number): Propagator {
    const found = this.known.get(level);
    if (found) return found;
    const lengthS = this.baseS * 2 ** level;
    const small = lengthS * this.rate <= SMALL_NORM;
    const result =
      small && level <= this.lowestLevel
        ? series(this.space, lengthS)
        : doubled(this.space, this.at(level - 1));
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

const TERMS = 12;

/** For lengths over which the system moves little: Taylor series. */
function series(space: StateSpace, lengthS: number): Propagator {
  const { n, a, bw, constants, timeUnitS } = space;
  const length = lengthS / timeUnitS;
  const scaled = new Float64Array(a);
  for (let i = 0; i < scaled.length; i += 1) scaled[i] *= length;
  const byInput = bw ? new Float64Array(n * POWERS) : null;
  // Over a step of this length the response to w^(k) is Σ A^i·bw·h^(i+k+1)/(i+k+1)!.
  if (bw && byInput) {
    eachPower(scaled, bw, n, (i, column) => {
      let factor = 1;
      for (let m = 1; m <= i; m += 1) factor /= m;
      for (let k = 0; k < POWERS; k += 1) {
        factor /= i + k + 1;
        const weight = factor * length ** (k + 1);
        for (let row = 0; row < n; row += 1) byInput[row * POWERS + k] += weight * column[row];
      }
    });
  }
  const byConstant = constants.map((e) => {
    const sum = new Float64Array(n);
    eachPower(scaled, e, n, (i, column) => {
      let factor = length;
      for (let m = 2; m <= i + 1; m += 1) factor /= m;
      for (let row = 0; row < n; row += 1) sum[row] += factor * column[row];
    });
    return sum;
  });
  return { lengthS, phi: smallExponential(scaled, n), byInput, byConstant };
}

/** The powers of a matrix times a vector. */
function eachPower(
  a: Float64Array,
  vector: Float64Array,
  n: number,
  use: (power: number, column: Float64Array) => void,
): void {
  let column = new Float64Array(vector);
  let next = new Float64Array(n);
  for (let power = 0; power <= TERMS; power += 1) {
    use(power, column);
    times(a, column, next, n);
    [column, next] = [next, column];
  }
}

function times(a: Float64Array, vector: Float64Array, into: Float64Array, n: number): void {
  for (let i = 0; i < n; i += 1) {
    let sum = 0;
    for (let j = 0; j < n; j += 1) sum += a[i * n + j] * vector[j];
    into[i] = sum;
  }
}

/** Two steps in one. */
function doubled({ n, timeUnitS }: StateSpace, one: Propagator): Propagator {
  const { phi, byInput } = one;
  const length = one.lengthS / timeUnitS;
  const byConstant = one.byConstant.map((column) => {
    const sum = new Float64Array(n);
    times(phi, column, sum, n);
    for (let i = 0; i < n; i += 1) sum[i] += column[i];
    return sum;
  });
  return {
    lengthS: 2 * one.lengthS,
    phi: multiplySquare(phi, phi, n),
    byInput: byInput && doubledInput(phi, byInput, n, length),
    byConstant,
  };
}

/** The second half sees the derivatives of w as they have become: w^(j)(h) = Σ w^(k)·h^(k−j)/(k−j)!. */
function doubledInput(phi: Float64Array, byInput: Float64Array, n: number, length: number): Float64Array {
  const result = new Float64Array(n * POWERS);
  for (let i = 0; i < n; i += 1) {
    const at = i * POWERS;
    for (let j = 0; j < n; j += 1) {
      const factor = phi[i * n + j];
      for (let k = 0; k < POWERS; k += 1) result[at + k] += factor * byInput[j * POWERS + k];
    }
    for (let k = 0; k < POWERS; k += 1) {
      let factor = 1;
      for (let j = k; j >= 0; j -= 1) {
        result[at + k] += factor * byInput[at + j];
        factor *= length / (k - j + 1);
      }
    }
  }
  return result;
}
