import { columnsOf, slopeReading, type StateSpace } from './state-space';
import { StepLevels } from './step-levels';
import { stepOperator, type StepOperator } from './step-operator';

/** Operators of odd lengths that are kept; a sampled loop comes back to the same few. */
const KEPT = 8;
/** Lengths that differ by less than this share are one. */
const SAME = 1e-10;

/** A system with everything that is prepared once for all steps through it. */
export class Regime {
  /** Factors of the states in y, ẏ, v, v̇: four rows. */
  readonly rows: Float64Array;
  /** Factors of w in the same four. */
  readonly direct: Float64Array;
  /** What each constant input adds to them. */
  readonly offsets: readonly Float64Array[];
  /** Columns of an operator, and where those of the constants begin. */
  readonly stride: number;
  readonly constantsAt: number;
  /** Does w play a part? */
  readonly driven: boolean;
  private readonly levels: StepLevels;
  private readonly operators = new Map<number, StepOperator>();
  private readonly odd: StepOperator[] = [];

  /** @param baseS length of level 0, s; @param deadTimeS 0 where v does not act on the system after a dead time */
  constructor(
    readonly space: StateSpace,
    private readonly baseS: number,
    private readonly deadTimeS: number,
  ) {
    this.levels = new StepLevels(space, baseS);
    const { y, v, n } = space;
    const { stride, powers } = columnsOf(space);
    this.stride = stride;
    this.constantsAt = n + powers;
    this.driven = powers > 0;
    const readings = [y, slopeReading(space, y), v, slopeReading(space, v)];
    this.rows = new Float64Array(4 * n);
    readings.forEach(({ z }, k) => this.rows.set(z, k * n));
    this.direct = Float64Array.from(readings, ({ w }) => w);
    this.offsets = space.constants.map((_, c) => Float64Array.from(readings, ({ ones }) => ones[c]));
  }

  lengthOf(level: number): number {
    return this.baseS * 2 ** level;
  }

  /** A step of length base·2^level. */
  step(level: number): StepOperator {
    let operator = this.operators.get(level);
    if (!operator) {
      operator = stepOperator(this.space, this.levels.at(level), this.deadTimeS, 2 ** level);
      this.operators.set(level, operator);
    }
    return operator;
  }

  /** A step of any length. */
  stepOver(lengthS: number): StepOperator {
    const { odd } = this;
    const found = odd.find(({ stepS }) => Math.abs(stepS - lengthS) <= SAME * lengthS);
    if (found) return found;
    const operator = stepOperator(this.space, this.levels.over(lengthS), this.deadTimeS, 0);
    odd.unshift(operator);
    if (odd.length > KEPT) odd.pop();
    return operator;
  }
}
