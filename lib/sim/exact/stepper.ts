import type { Trajectory } from '../metrics';
import { Integrator, type Span } from './integrator';
import type { Floors, Levels } from './loop-scales';
import { pairError, type PairError } from './pair-error';
import type { StepOperator } from './step-operator';

export interface StepperSettings extends Levels, Floors {
  readonly order: number;
  /** Dead time between the controller output and the plant, s, and what is added to the output after it. */
  readonly deadTimeS: number;
  readonly load: number;
}

/** A response that grows without bound, or one that needs more steps than anyone waits for. */
export type Refusal = 'DIVERGED' | 'TOO_LONG';

/** A response this many times larger than expected has left every useful range. */
const DIVERGED = 1e12;
export const MOST_PIECES = 1_000_000;
/** Error of the cubic of y, as a share of the largest so far. */
const Y_ERROR = 1e-6;
/** The same of v. Where v comes back after a dead time its errors add up: the longer, the less is allowed. */
const V_ERROR = 2e-6;
const ECHOED_ERROR = 1e-6;
const LONG = 500;
const MOST_HALVINGS = 5;

/**
 * Steps through the spans of a response, exactly but for the cubic that stands for the delayed output over a step.
 * Steps are taken in pairs: where the cubic over a pair misses the point between by too much, the pair is taken again
 * with half the step; where it misses by little, the step doubles.
 */
export class Stepper {
  level: number;
  leastLevel: number;
  mostPieces = MOST_PIECES;
  /** Largest |y| and |v| so far. */
  peakY = 0;
  peakV = 0;
  private readonly integrator: Integrator;
  private readonly error: PairError = { y: 0.5, v: 0.5 };

  constructor(readonly settings: StepperSettings) {
    const { order, deadTimeS, load, firstLevel, leastLevel } = settings;
    this.level = firstLevel;
    this.leastLevel = leastLevel;
    this.integrator = new Integrator(order, deadTimeS, load);
  }

  get trajectory(): Trajectory {
    return this.integrator.trajectory;
  }

  get timeS(): number {
    return this.integrator.timeS;
  }

  /** v at the current time, at the start of a span. */
  startV(span: Span): number {
    return this.integrator.startV(span);
  }

  /**
   * Goes on through a span, to its end or until `enoughS`; stops earlier at an event. Returns whether it did.
   * Steps within a span stand on multiples of their length from its start.
   */
  run(span: Span, enoughS: number): boolean {
    const { baseS } = this.settings;
    const { integrator } = this;
    const { regime } = span;
    const startS = this.timeS;
    let operator = regime.step(this.level);
    // In units of baseS, a sum of powers of two: exact.
    let position = 0;
    integrator.enter(regime);
    while (this.timeS < span.endS && this.timeS < enoughS && !this.refusal) {
      const from = this.timeS;
      const leftS = span.endS - from;
      if (leftS < 2 * operator.stepS * (1 - 1e-9)) {
        if (this.takePair(span, regime.stepOver(leftS / 2), from + leftS / 2, span.endS)) {
          if (this.stoppedIn(span)) return true;
          continue;
        }
      } else {
        const { units } = operator;
        const whole = leftS <= 2 * operator.stepS * (1 + 1e-9);
        const endS = whole ? span.endS : startS + (position + 2 * units) * baseS;
        if (this.takePair(span, operator, startS + (position + units) * baseS, endS)) {
          if (this.stoppedIn(span)) return true;
          position += 2 * units;
          if (this.mayDouble() && position % (4 * units) === 0) operator = regime.step((this.level += 1));
          continue;
        }
      }
      integrator.restore(regime);
      this.level = Math.max(this.level - this.halvings(), this.leastLevel);
      // A pair that was cut short by the span's end is not shortened by that alone.
      while (regime.lengthOf(this.level) > 0.3 * leftS) this.level -= 1;
      operator = regime.step(this.level);
    }
    return false;
  }

  /** Keeps the last pair, up to the event where there is one in it. */
  private stoppedIn(span: Span): boolean {
    const { integrator } = this;
    const at = span.event ? span.event(integrator) : null;
    if (at !== null) {
      integrator.restore(span.regime);
      const from = integrator.timeS;
      const half = (at - from) / 2;
      if (half > 0) this.takePair(span, span.regime.stepOver(half), from + half, at);
    }
    this.notePeaks();
    return at !== null;
  }

  /** Why the response is not followed any further. */
  get refusal(): Refusal | null {
    const { peakY, peakV, trajectory, settings } = this;
    // Written so that a value that is not a number counts as too large.
    if (!(peakY <= DIVERGED * settings.yFloor && peakV <= DIVERGED * settings.vFloor)) return 'DIVERGED';
    return trajectory.count > this.mostPieces ? 'TOO_LONG' : null;
  }

  /** How often the step has to be halved for an error that falls with its fourth power. */
  private halvings(): number {
    const excess = Math.max(this.error.y / this.yAllowed(), this.error.v / this.vAllowed());
    return Math.min(MOST_HALVINGS, Math.max(1, Math.round(0.25 * Math.log2(excess))));
  }

  private mayDouble(): boolean {
    return this.error.y <= this.yAllowed() / 32 && this.error.v <= this.vAllowed() / 32;
  }

  private yAllowed(): number {
    return Y_ERROR * Math.max(this.peakY, this.settings.yFloor);
  }

  private vAllowed(): number {
    const share =
      this.settings.deadTimeS > 0 ? ECHOED_ERROR / (1 + Math.min(4, this.trajectory.count / LONG)) : V_ERROR;
    return share * Math.max(this.peakV, this.settings.vFloor);
  }

  private notePeaks(): void {
    const { pairV, trajectory } = this.integrator;
    const { y0, y1, count } = trajectory;
    for (let i = Math.max(0, count - 2); i < count; i += 1)
      this.peakY = Math.max(this.peakY, Math.abs(y0[i]), Math.abs(y1[i]));
    for (let i = 0; i < 8; i += 2) this.peakV = Math.max(this.peakV, Math.abs(pairV[i]));
  }

  private takePair(span: Span, operator: StepOperator, middleS: number, endS: number): boolean {
    const { integrator, error } = this;
    const vAllowed = this.vAllowed();
    integrator.save();
    const first = integrator.take(span, operator, middleS, 0, vAllowed);
    const even = integrator.take(span, operator, endS, 4, vAllowed) && first;
    pairError(integrator, error);
    return (even && error.y <= this.yAllowed() && error.v <= vAllowed) || this.level <= this.leastLevel;
  }
}
