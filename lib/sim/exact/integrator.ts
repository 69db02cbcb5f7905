import { Trajectory } from '../metrics';
import { DelayedOutput } from './delayed-output';
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
  readonly event: ((pair: LastPair) => number | null) | null;
}

/** The last two pieces of a trajectory, with v beside them. */
export interface LastPair {
  readonly trajectory: Trajectory;
  /** v, v̇ at the start and at the end of each of the two. */
  readonly pairV: Float64Array;
}

/**
 * Takes single steps through a span and writes them into a trajectory: exact but for the cubic that stands for the
 * delayed output over the step.
 */
export class Integrator implements LastPair {
  readonly trajectory = new Trajectory(512);
  readonly pairV = new Float64Array(8);
  timeS = 0;
  private z: Float64Array;
  private next: Float64Array;
  private readonly saved: Float64Array;
  private savedTimeS = 0;
  private savedCount = 0;
  /** What the states make of y, ẏ, v, v̇. */
  private readonly now = new Float64Array(4);
  private readonly history: DelayedOutput;

  /** @param load added to the delayed output */
  constructor(
    private readonly order: number,
    private readonly deadTimeS: number,
    private readonly load: number,
  ) {
    this.history = new DelayedOutput(this.trajectory);
    this.z = new Float64Array(order);
    this.saved = new Float64Array(order);
    this.next = new Float64Array(order);
  }

  /** Remembers where it stands, for `restore`. */
  save(): void {
    const { saved, z } = this;
    for (let i = 0; i < saved.length; i += 1) saved[i] = z[i];
    this.savedTimeS = this.timeS;
    this.savedCount = this.trajectory.count;
    this.history.mark();
  }

  restore(regime: Regime): void {
    const { saved, z } = this;
    for (let i = 0; i < saved.length; i += 1) z[i] = saved[i];
    this.timeS = this.savedTimeS;
    this.trajectory.count = this.savedCount;
    this.history.rewind();
    this.enter(regime);
  }

  /**
   * One step to a time, as the first (into 0) or second (into 4) piece of a pair. False when what comes back after the
   * dead time misses the cubic in its place by more than `allowed`.
   */
  take(span: Span, operator: StepOperator, toS: number, into: 0 | 4, allowed: number): boolean {
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
          even = Math.abs(history.value + load - 0.5 * (w0 + w1) - 0.125 * (s0 - s1)) <= allowed;
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
      this.enter(regime);
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
    this.enter(regime);
    this.write(span, index, into + 2, w1, s1 / stepS);
    return even;
  }

  /** v at the current time, at the start of a span. */
  startV({ regime, constant, delayed, input }: Span): number {
    const { history, deadTimeS, load } = this;
    this.enter(regime);
    let w = 0;
    if (!delayed) w = input;
    else {
      history.after(this.timeS - deadTimeS, 1e-9 * deadTimeS);
      w = history.value + load;
    }
    return this.now[2] + regime.direct[2] * w + regime.offsets[constant][2];
  }

  /** Reads the signals off the states as a regime has them. */
  enter({ rows }: Regime): void {
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
