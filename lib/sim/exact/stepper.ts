import { Trajectory } from '../metrics';
import { DelayedOutput } from './delayed-output';
import { pairError, type PairError } from './pair-error';
import type { Floors, Levels } from './loop-scales';
import type { Regime } from './regime';
import { dot, POWERS, type Reading } from './state-space';
import type { StepOperator } from './step-operator';

/** A stretch of time over which one regime holds and nothing sharp reaches the plant. */
export interface Span {
  readonly endS: number;
  readonly regime: Regime;
  /** Which constant input of the regime. */
  readonly constant: number;
  /** What leaves the controller; null: v itself. */
  readonly held: number | null;
  /** What reaches the plant: a constant, or the controller output one dead time ago plus the load. */
  readonly input: number | 'delayed';
  /** Where v first asks for another regime within the last two pieces, s; null where it does not. */
  readonly event?: (stepper: Stepper) => number | null;
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
const MOST_PIECES = 1_000_000;
/** Errors of the cubics, as shares of the largest y and v so far. */
const Y_ERROR = 1e-7;
const V_ERROR = 2e-7;

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
  z: Float64Array;
  peakY = 0;
  peakV = 0;
  /** v, v̇ at the start and at the end of each of the last two pieces. */
  readonly pairV = new Float64Array(8);
  /** Pieces before the last pair. */
  countBefore = 0;
  private readonly history: DelayedOutput;
  private readonly saved: Float64Array;
  private next: Float64Array;
  /** What the states make of y, ẏ, v, v̇. */
  private readonly now = new Float64Array(4);
  private readonly error: PairError = { y: 0, v: 0 };

  constructor(readonly settings: StepperSettings) {
    this.level = settings.firstLevel;
    this.leastLevel = settings.leastLevel;
    this.history = new DelayedOutput(this.trajectory);
    this.z = new Float64Array(settings.order);
    this.saved = new Float64Array(settings.order);
    this.next = new Float64Array(settings.order);
  }

  /**
   * Goes on through a span, to its end or until `enough`; stops earlier at an event. Returns whether it did.
   * Steps within a span stand on multiples of their length from its start.
   */
  run(span: Span, enoughS = Infinity): boolean {
    const { settings } = this;
    this.readStates(span.regime);
    const startS = this.timeS;
    let position = 0;
    for (;;) {
      const leftS = span.endS - this.timeS;
      if (leftS <= 0 || this.timeS >= enoughS || this.refusal) return false;
      let length = 2 ** this.level;
      let stepS = settings.baseS * length;
      const last = leftS <= 2 * stepS * (1 + 1e-9);
      const fitted = last && leftS < 2 * stepS * (1 - 1e-9);
      if (fitted) stepS = leftS / 2;
      const operator = fitted ? span.regime.stepOver(stepS) : span.regime.step(this.level);
      const endS = last ? span.endS : startS + (position + 2 * length) * settings.baseS;
      const from = this.timeS;
      const good = this.takePair(
        span,
        operator,
        fitted ? from + stepS : startS + (position + length) * settings.baseS,
        endS,
      );
      if (!good && this.level > this.leastLevel) {
        this.goBack(span.regime, from);
        this.level -= 1;
        while (fitted && settings.baseS * 2 ** this.level > 0.6 * stepS && this.level > this.leastLevel)
          this.level -= 1;
        continue;
      }
      const at = span.event ? span.event(this) : null;
      if (at !== null) {
        this.goBack(span.regime, from);
        if (at > from) {
          const half = (at - from) / 2;
          this.takePair(span, span.regime.stepOver(half), from + half, at);
        }
        this.keepPair();
        return true;
      }
      this.keepPair();
      position += 2 * length;
      length *= 4;
      if (!fitted && good && this.mayDouble() && position % length === 0) this.level += 1;
    }
  }

  /** Why the response is not followed any further. */
  get refusal(): Refusal | null {
    const { peakY, peakV, trajectory, settings } = this;
    // Written so that a value that is not a number counts as too large.
    if (!(peakY <= DIVERGED * settings.yFloor && peakV <= DIVERGED * settings.vFloor)) return 'DIVERGED';
    return trajectory.count > MOST_PIECES ? 'TOO_LONG' : null;
  }

  private mayDouble(): boolean {
    const { error, settings } = this;
    return (
      error.y <= (0.5 / 16) * Y_ERROR * Math.max(this.peakY, settings.yFloor) &&
      error.v <= (0.5 / 16) * V_ERROR * Math.max(this.peakV, settings.vFloor)
    );
  }

  private vAllowed(): number {
    return V_ERROR * Math.max(this.peakV, this.settings.vFloor);
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
    this.saved.set(this.z);
    this.history.mark();
    const first = this.take(span, operator, middleS, 0);
    const even = this.take(span, operator, endS, 4) && first;
    pairError(this.trajectory, this.pairV, this.error);
    const { error, settings } = this;
    return even && error.y <= Y_ERROR * Math.max(this.peakY, settings.yFloor) && error.v <= this.vAllowed();
  }

  /** One step to a time; false when what comes back after the dead time is too uneven for one cubic. */
  private take(span: Span, operator: StepOperator, toS: number, into: number): boolean {
    const { settings, history, trajectory, z, next, timeS } = this;
    const { regime, held, input, constant } = span;
    const { order, deadTimeS, load } = settings;
    const { phi, gamma, stepS, echo } = operator;
    let even = true;
    let w0 = 0;
    let s0 = 0;
    let w1 = 0;
    let s1 = 0;
    if (input !== 'delayed') {
      w0 = input;
      w1 = input;
    } else {
      const margin = 1e-6 * stepS;
      history.after(timeS - deadTimeS, margin);
      w0 = history.value + load;
      s0 = stepS * history.slope;
      if (toS - deadTimeS <= timeS + margin) {
        const piece = history.before(toS - deadTimeS, margin);
        w1 = history.value + load;
        s1 = stepS * history.slope;
        if (piece !== history.piece) {
          history.between(0.5 * (timeS + toS) - deadTimeS);
          even = Math.abs(history.value + load - 0.5 * (w0 + w1) - 0.125 * (s0 - s1)) <= this.vAllowed();
        }
      } else if (held !== null) w1 = held + load;
    }
    const one = operator.ones[constant];
    for (let i = 0, row = 0; i < order; i += 1, row += order) {
      let sum = one[i];
      for (let j = 0; j < order; j += 1) sum += phi[row + j] * z[j];
      next[i] = sum;
    }
    if (gamma)
      for (let i = 0, g = 0; i < order; i += 1, g += POWERS) next[i] += gamma[g] * w0 + gamma[g + 1] * s0;
    const index = trajectory.add(toS);
    this.write(span, index, into, w0, s0 / stepS);
    if (echo && held === null && toS - deadTimeS > timeS + 1e-6 * stepS) {
      const { pairV } = this;
      const v0 = pairV[into];
      const d0 = stepS * pairV[into + 1];
      const v1 = value(regime.space.v, next, constant);
      const d1 = stepS * value(regime.dv, next, constant);
      const { start, end, solve } = echo;
      const p = start[0] * v0 + start[1] * d0 + end[0] * v1 + end[1] * d1 + load;
      const q = start[2] * v0 + start[3] * d0 + end[2] * v1 + end[3] * d1;
      w1 = solve[0] * p + solve[1] * q;
      s1 = solve[2] * p + solve[3] * q;
    }
    if (gamma)
      for (let i = 0, g = 0; i < order; i += 1, g += POWERS) next[i] += gamma[g + 2] * w1 + gamma[g + 3] * s1;
    this.z = next;
    this.next = z;
    this.timeS = toS;
    this.readStates(regime);
    this.write(span, index, into + 2, w1, s1 / stepS);
    return even;
  }

  /** v at the current time, at the start of a span. */
  startV({ regime, constant, input }: Span): number {
    const { settings, history } = this;
    this.readStates(regime);
    let w = 0;
    if (input !== 'delayed') w = input;
    else {
      history.after(this.timeS - settings.deadTimeS, 1e-6 * settings.baseS * 2 ** this.level);
      w = history.value + settings.load;
    }
    return this.now[2] + regime.space.v.w * w + regime.space.v.ones[constant];
  }

  private readStates({ space, dy, dv }: Regime): void {
    const { now, z } = this;
    now[0] = dot(space.y.z, z);
    now[1] = dot(dy.z, z);
    now[2] = dot(space.v.z, z);
    now[3] = dot(dv.z, z);
  }

  /** Signals at one end of a piece for an input w that changes by dw per second; `into` is the place in pairV. */
  private write({ regime, constant, held }: Span, index: number, into: number, w: number, dw: number): void {
    const { trajectory, now, pairV } = this;
    const { space, dy, dv } = regime;
    const { y, v } = space;
    const yValue = now[0] + y.w * w + y.ones[constant];
    const ySlope = now[1] + dy.w * w + y.w * dw + dy.ones[constant];
    const vValue = now[2] + v.w * w + v.ones[constant];
    const vSlope = now[3] + dv.w * w + v.w * dw + dv.ones[constant];
    pairV[into] = vValue;
    pairV[into + 1] = vSlope;
    const uValue = held === null ? vValue : held;
    const uSlope = held === null ? vSlope : 0;
    if ((into & 2) === 0) {
      trajectory.y0[index] = yValue;
      trajectory.dy0[index] = ySlope;
      trajectory.u0[index] = uValue;
      trajectory.du0[index] = uSlope;
    } else {
      trajectory.y1[index] = yValue;
      trajectory.dy1[index] = ySlope;
      trajectory.u1[index] = uValue;
      trajectory.du1[index] = uSlope;
    }
  }
}

function value(reading: Reading, z: Float64Array, constant: number): number {
  return dot(reading.z, z) + reading.ones[constant];
}
