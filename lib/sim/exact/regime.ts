import { slopeReading, type Reading, type StateSpace } from './state-space';
import { StepLevels } from './step-levels';
import { stepOperator, type StepOperator } from './step-operator';

/** A system with everything that is prepared once for all steps through it. */
export class Regime {
  readonly dy: Reading;
  readonly dv: Reading;
  private readonly levels: StepLevels;
  private readonly operators = new Map<number, StepOperator>();

  /** @param baseS length of level 0, s; @param deadTimeS 0 where v does not act on the system after a dead time */
  constructor(
    readonly space: StateSpace,
    baseS: number,
    lowestLevel: number,
    private readonly deadTimeS: number,
  ) {
    this.levels = new StepLevels(space, baseS, lowestLevel);
    this.dy = slopeReading(space, space.y);
    this.dv = slopeReading(space, space.v);
  }

  /** A step of length base·2^level. */
  step(level: number): StepOperator {
    let operator = this.operators.get(level);
    if (!operator) {
      operator = stepOperator(this.space, this.levels.at(level), this.deadTimeS);
      this.operators.set(level, operator);
    }
    return operator;
  }

  /** A step of any length, used once. */
  stepOver(lengthS: number): StepOperator {
    return stepOperator(this.space, this.levels.over(lengthS), this.deadTimeS);
  }
}
