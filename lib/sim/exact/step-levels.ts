import { multiplySquare, norm, SMALL_NORM, smallExponential, type Matrix } from './matrix';

/**
 * Exponentials of one matrix over the lengths base·2^level: each is the square of the one below, so that steps of
 * many lengths cost little more than one.
 */
export class StepLevels {
  private readonly known = new Map<number, Matrix>();
  /** Highest level at which the series converges at once. */
  private readonly seriesLevel: number;

  /** @param matrix of ẋ = M x per second, @param baseS length of level 0 in s */
  constructor(
    private readonly matrix: Matrix,
    private readonly size: number,
    private readonly baseS: number,
  ) {
    const perBase = norm(matrix, size) * baseS;
    this.seriesLevel = perBase > 0 ? Math.floor(Math.log2(SMALL_NORM / perBase)) : Infinity;
  }

  at(level: number): Matrix {
    const found = this.known.get(level);
    if (found) return found;
    const result =
      level <= this.seriesLevel
        ? smallExponential(this.scaled(level), this.size)
        : multiplySquare(this.at(level - 1), this.at(level - 1), this.size);
    this.known.set(level, result);
    return result;
  }

  private scaled(level: number): Matrix {
    const length = this.baseS * 2 ** level;
    return this.matrix.map((value) => value * length);
  }
}
