import { Trajectory } from '../metrics';
import { DelayedOutput } from './delayed-output';
import { pairError, type PairError } from './pair-error';
import type { Floors, Levels } from './loop-scales';
import type { Regime } from './regime';
import type { StepOperator } from './step-operator';

/** A stretch of time over which one regime holds and nothing sharp reaches the plant. */
export interface Span {
  readonly endS: number;
  readonly regime: Regime;
  /** Which constant input of the regime. */
  readonly constant: number;
  /** What leaves the controller, where that is not v itself but a constant; NaN otherwise. */
  readonly held: number;
  /** The controller output of one dead time ago, plus the load, reaches the plant; otherwise `input` does. */
  readonly delayed: boolean;
  readonly input: number;
  /** Where v first asks for another regime within the last two pieces, s; null where it does not, or nothing asks. */
  readonly event: ((stepper: Stepper) => number | null) | null;
}

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
  readonly trajectory = new Trajectory(512);
  timeS = 0;
  level: number;
  leastLevel: number;
  mostPieces = MOST_PIECES;
  peakY: number;
  peakV: number;
  /** v, v̇ at the start and at the end of each of the last two pieces. */
  readonly pairV = new Float64Array(8);
  private z: Float64Array;
  private next: Float64Array;
  private readonly saved: Float64Array;
  /** What the states make of y, ẏ, v, v̇. */
  private readonly now = new Float64Array(4);
  private readonly history: DelayedOutput;
  private readonly error: PairError = { y: 0.5, v: 0.5 };
  private readonly order: number;
  private readonly deadTimeS: number;
  private readonly load: number;
  /** Pieces before the last pair. */
  private countBefore = 0;

  constructor(readonly settings: StepperSettings) {
    const { order, deadTimeS, load, firstLevel, leastLevel } = settings;
    this.level = firstLevel;
    this.leastLevel = leastLevel;
    this.order = order;
    this.deadTimeS = deadTimeS;
    this.load = load;
    this.peakY = 0;
    this.peakV = 0;
    this.history = new DelayedOutput(this.trajectory);
    this.z = new Float64Array(order);
    this.saved = new Float64Array(order);
    this.next = new Float64Array(order);
  }

  /**
   * Goes on through a span, to its end or until `enoughS`; stops earlier at an event. Returns whether it did.
   * Steps within a span stand on multiples of their length from its start.
   */
  run(span: Span, enoughS: number): boolean {
    const { baseS } = this.settings;
    const { regime, event } = span;
    const startS = this.timeS;
    let operator = regime.step(this.level);
    // In units of baseS, a sum of powers of two: exact.
    let position = 0;
    this.readStates(regime);
    while (this.timeS < span.endS && this.timeS < enoughS && !this.refusal) {
      const from = this.timeS;
      const leftS = span.endS - from;
      if (leftS < 2 * operator.stepS * (1 - 1e-9)) {
        if (this.takePair(span, regime.stepOver(leftS / 2), from + leftS / 2, span.endS)) {
          if (this.stoppedBy(event, span, from)) return true;
          continue;
        }
      } else {
        const { units } = operator;
        const whole = leftS <= 2 * operator.stepS * (1 + 1e-9);
        const endS = whole ? span.endS : startS + (position + 2 * units) * baseS;
        if (this.takePair(span, operator, startS + (position + units) * baseS, endS)) {
          if (this.stoppedBy(event, span, from)) return true;
          position += 2 * units;
          if (this.mayDouble() && position % (4 * units) === 0) operator = regime.step((this.level += 1));
          continue;
        }
      }
      this.goBack(regime, from);
      this.level = Math.max(this.level - this.halvings(), this.leastLevel);
      // A pair that was cut short by the span's end is not shortened by that alone.
      while (regime.lengthOf(this.level) > 0.3 * leftS) this.level -= 1;
      operator = regime.step(this.level);
    }
    return false;
  }

  /** Keeps the last pair, up to the event where there is one in it. */
  private stoppedBy(event: Span['event'], span: Span, from: number): boolean {
    const at = event ? event(this) : null;
    if (at !== null) {
      this.goBack(span.regime, from);
      const half = (at - from) / 2;
      if (half > 0) this.takePair(span, span.regime.stepOver(half), from + half, at);
    }
    this.keepPair();
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
      this.deadTimeS > 0 ? ECHOED_ERROR / (1 + Math.min(4, this.trajectory.count / LONG)) : V_ERROR;
    return share * Math.max(this.peakV, this.settings.vFloor);
  }

  private goBack(regime: Regime, timeS: number): void {
    this.trajectory.count = this.countBefore;
    this.timeS = timeS;
    this.z.set(this.saved);
    this.history.rewind();
    this.readStates(regime);
  }

  private keepPair(): void {
    const { pairV, trajectory } = this;
    for (let i = this.countBefore; i < trajectory.count; i += 1)
      this.peakY = Math.max(this.peakY, Math.abs(trajectory.y0[i]), Math.abs(trajectory.y1[i]));
    for (let i = 0; i < 8; i += 2) this.peakV = Math.max(this.peakV, Math.abs(pairV[i]));
    this.countBefore = trajectory.count;
  }

  private takePair(span: Span, operator: StepOperator, middleS: number, endS: number): boolean {
    const { saved, z } = this;
    for (let i = 0; i < saved.length; i += 1) saved[i] = z[i];
    this.history.mark();
    const first = this.take(span, operator, middleS, 0);
    const even = this.take(span, operator, endS, 4) && first;
    pairError(this.trajectory, this.pairV, this.error);
    const good = even && this.error.y <= this.yAllowed() && this.error.v <= this.vAllowed();
    return good || this.level <= this.leastLevel;
  }

  /** One step to a time; false when what comes back after the dead time is too uneven for one cubic. */
  private take(span: Span, operator: StepOperator, toS: number, into: number): boolean {
    const { history, trajectory, timeS, order, deadTimeS, load } = this;
    const { held, input, constant, regime } = span;
    const isHeld = !Number.isNaN(held);
    const { block, stepS, echo } = operator;
    const index = trajectory.add(toS);
    let even = true;
    let w0 = 0;
    let s0 = 0;
    let w1 = 0;
    let s1 = 0;
    let echoed = false;
    if (!span.delayed) {
      w0 = input;
      w1 = input;
    } else {
      const margin = 1e-6 * Math.min(stepS, deadTimeS);
      history.after(timeS - deadTimeS, margin);
      w0 = history.value + load;
      s0 = stepS * history.slope;
      if (toS - deadTimeS <= timeS + margin) {
        const within = history.before(toS - deadTimeS, margin);
        w1 = history.value + load;
        s1 = stepS * history.slope;
        if (!within) {
          history.between(0.5 * (timeS + toS) - deadTimeS);
          even = Math.abs(history.value + load - 0.5 * (w0 + w1) - 0.125 * (s0 - s1)) <= this.vAllowed();
        }
      } else if (isHeld) w1 = held + load;
      else echoed = true;
    }
    this.write(span, index, into, w0, s0 / stepS);
    const { z, next } = this;
    const { stride, constantsAt, driven } = regime;
    for (let i = 0, row = 0; i < order; i += 1, row += stride) {
      let sum = block[row + constantsAt + constant];
      for (let j = 0; j < order; j += 1) sum += block[row + j] * z[j];
      if (driven) sum += block[row + order] * w0 + block[row + order + 1] * s0;
      next[i] = sum;
    }
    this.z = next;
    this.next = z;
    if (echoed && echo) {
      this.readStates(regime);
      const v0 = this.pairV[into];
      const d0 = stepS * this.pairV[into + 1];
      const v1 = this.now[2] + regime.offsets[constant][2];
      const d1 = stepS * (this.now[3] + regime.offsets[constant][3]);
      const { start, end, solve } = echo;
      const p = start[0] * v0 + start[1] * d0 + end[0] * v1 + end[1] * d1 + load;
      const q = start[2] * v0 + start[3] * d0 + end[2] * v1 + end[3] * d1;
      w1 = solve[0] * p + solve[1] * q;
      s1 = solve[2] * p + solve[3] * q;
    }
    if (driven)
      for (let i = 0, g = order + 2; i < order; i += 1, g += stride)
        next[i] += block[g] * w1 + block[g + 1] * s1;
    this.timeS = toS;
    this.readStates(regime);
    this.write(span, index, into + 2, w1, s1 / stepS);
    return even;
  }

  /** v at the current time, at the start of a span. */
  startV({ regime, constant, delayed, input }: Span): number {
    const { history, deadTimeS, load } = this;
    this.readStates(regime);
    let w = 0;
    if (!delayed) w = input;
    else {
      history.after(this.timeS - deadTimeS, 1e-9 * deadTimeS);
      w = history.value + load;
    }
    return this.now[2] + regime.direct[2] * w + regime.offsets[constant][2];
  }

  private readStates({ rows }: Regime): void {
    const { now, z, order } = this;
    for (let k = 0, at = 0; k < 4; k += 1) {
      let sum = 0;
      for (let j = 0; j < order; j += 1, at += 1) sum += rows[at] * z[j];
      now[k] = sum;
    }
  }

  /** Signals at one end of a piece for an input w that changes by dw per second; `into` is the place in pairV. */
  private write(span: Span, index: number, into: number, w: number, dw: number): void {
    const { trajectory, now, pairV } = this;
    const { direct, offsets } = span.regime;
    const offset = offsets[span.constant];
    const { held } = span;
    const isHeld = !Number.isNaN(held);
    const y = now[0] + direct[0] * w + offset[0];
    const dy = now[1] + direct[1] * w + direct[0] * dw + offset[1];
    const v = now[2] + direct[2] * w + offset[2];
    const dv = now[3] + direct[3] * w + direct[2] * dw + offset[3];
    pairV[into] = v;
    pairV[into + 1] = dv;
    const u = isHeld ? held : v;
    const du = isHeld ? 0 : dv;
    if ((into & 2) === 0) {
      trajectory.y0[index] = y;
      trajectory.dy0[index] = dy;
      trajectory.u0[index] = u;
      trajectory.du0[index] = du;
    } else {
      trajectory.y1[index] = y;
      trajectory.dy1[index] = dy;
      trajectory.u1[index] = u;
      trajectory.du1[index] = du;
    }
  }
}
