import { Trajectory } from '../metrics';
import { DelayedOutput } from './delayed-output';
import type { RunSetup } from './linear-loop';
import { pairError, type PairError } from './pair-error';
import { slopeReading, type Reading } from './state-space';
import { StepLevels } from './step-levels';
import { augmented, COLUMNS, stepOperator, type StepOperator } from './step-operator';

/** Errors of the cubics, as shares of the largest y and u so far. */
const Y_ERROR = 1e-6;
const U_ERROR = 2e-6;
/** No step is shorter than this share of the first one, or of the dead time. */
const SHORTEST = 1 / 16;
const SHORTEST_PER_DEAD_TIME = 1 / 256;
/** Steps are made no shorter than this share of the time already covered. */
const MOST_STEPS = 2e6;

/**
 * One response of a linear loop from rest, by exact stepping. Steps are taken in pairs; where the cubic over a pair
 * misses the point between by too much the pair is taken again with half the step, where it misses by little the step
 * doubles. Pairs stand on multiples of their own length, so that up to the dead time everything that comes back after
 * it falls on the ends of steps; longer steps are taken only where nothing sharp comes back any more.
 */
export class LinearRun {
  readonly trajectory = new Trajectory(512);
  private readonly operators = new Map<number, StepOperator>();
  private readonly levels: StepLevels;
  private readonly history: DelayedOutput;
  private readonly readings: readonly [Reading, Reading, Reading, Reading];
  private readonly leastLevel: number;
  private level: number;
  /** Time in units of baseS: a sum of powers of two, exact. */
  private position = 0;
  private z: Float64Array;
  private next: Float64Array;
  private readonly saved: Float64Array;
  /** What the states alone make of y, ẏ, u, u̇ at the current position. */
  private readonly now = new Float64Array(4);
  private readonly savedNow = new Float64Array(4);
  /** Pieces before the current pair. */
  private countBefore = 0;
  peakY = 0;
  peakU = 0;
  private readonly error: PairError = { y: 0, u: 0, wholeY: 0, wholeU: 0 };

  constructor(private readonly setup: RunSetup) {
    const { space, baseS, firstStepS, deadTimeS } = setup;
    const { n, y, u } = space;
    const { matrix, size } = augmented(space);
    this.levels = new StepLevels(matrix, size, baseS / space.timeUnitS);
    this.history = new DelayedOutput(this.trajectory);
    this.readings = [y, slopeReading(space, y), u, slopeReading(space, u)];
    this.z = new Float64Array(n);
    this.next = new Float64Array(n);
    this.saved = new Float64Array(n);
    const longest = deadTimeS > 0 ? -1 : Infinity;
    this.level = Math.min(longest, Math.floor(Math.log2(firstStepS / baseS)));
    const least =
      deadTimeS > 0
        ? Math.min(firstStepS * SHORTEST, deadTimeS * SHORTEST_PER_DEAD_TIME)
        : firstStepS * SHORTEST;
    this.leastLevel = Math.floor(Math.log2(least / baseS));
  }

  /** Goes on until the trajectory covers the time. */
  extendTo(timeS: number): Trajectory {
    const { baseS } = this.setup;
    const leastLevel = Math.max(this.leastLevel, Math.ceil(Math.log2(timeS / MOST_STEPS / baseS)));
    while (this.position * baseS < timeS) this.takePair(leastLevel);
    return this.trajectory;
  }

  private takePair(leastLevel: number): void {
    const { trajectory, setup, error, history } = this;
    const { position, level } = this;
    const { piece } = history;
    this.saved.set(this.z);
    this.savedNow.set(this.now);
    const operator = this.operatorAt(level);
    const length = 2 ** level;
    const firstFits = this.take(operator, position + length);
    const fits = this.take(operator, position + 2 * length) && firstFits;
    pairError(trajectory, error);
    const yAllowed = Y_ERROR * Math.max(this.peakY, setup.yFloor);
    const uAllowed = U_ERROR * Math.max(this.peakU, setup.uFloor);
    const good = fits && error.y <= yAllowed && error.u <= uAllowed;
    if (!good && level > leastLevel) {
      trajectory.count = this.countBefore;
      this.position = position;
      this.z.set(this.saved);
      this.now.set(this.savedNow);
      history.piece = piece;
      this.level -= 1;
      return;
    }
    this.notePeaks();
    this.countBefore = trajectory.count;
    if (
      error.wholeY <= 0.5 * yAllowed &&
      error.wholeU <= 0.5 * uAllowed &&
      this.position % (4 * length) === 0
    )
      this.level += 1;
  }

  private notePeaks(): void {
    const { y1, u0, u1 } = this.trajectory;
    for (let i = this.countBefore; i < this.trajectory.count; i += 1) {
      this.peakY = Math.max(this.peakY, Math.abs(y1[i]));
      this.peakU = Math.max(this.peakU, Math.abs(u0[i]), Math.abs(u1[i]));
    }
  }

  private operatorAt(level: number): StepOperator {
    const { space, baseS, deadTimeS } = this.setup;
    let operator = this.operators.get(level);
    if (!operator) {
      operator = stepOperator(space, this.levels.at(level), baseS * 2 ** level, deadTimeS);
      this.operators.set(level, operator);
    }
    return operator;
  }

  /** One step to a position; false when what comes back after the dead time is too uneven for one cubic. */
  private take(operator: StepOperator, to: number): boolean {
    const { setup, history, trajectory, z, next, now, readings } = this;
    const { space, baseS, deadTimeS, load } = setup;
    const { n } = space;
    const { phi, gamma, stepS, echo } = operator;
    const acts = deadTimeS > 0 && this.position >= 1;
    let even = true;
    let w0 = 0;
    let s0 = 0;
    let w1 = 0;
    let s1 = 0;
    if (acts) {
      history.after((this.position - 1) * baseS);
      w0 = history.value + load;
      s0 = stepS * history.slope;
      if (!echo) {
        const last = history.before((to - 1) * baseS);
        w1 = history.value + load;
        s1 = stepS * history.slope;
        if (last !== history.piece)
          even = this.isEven(w0, s0, w1, s1, (0.5 * (this.position + to) - 1) * baseS);
      }
    }
    for (let i = 0; i < n; i += 1) {
      const g = i * COLUMNS;
      const row = i * n;
      let sum = gamma[g] * w0 + gamma[g + 1] * s0 + gamma[g + 4];
      for (let j = 0; j < n; j += 1) sum += phi[row + j] * z[j];
      next[i] = sum;
    }
    const index = trajectory.add(to * baseS);
    this.write(index, 0, w0, s0 / stepS);
    if (echo) {
      const uFree = dot(readings[2].z, next) + readings[2].one;
      const slopeFree = stepS * (dot(readings[3].z, next) + readings[3].one);
      const u0 = trajectory.u0[index];
      const d0 = stepS * trajectory.du0[index];
      const { start, end, solve } = echo;
      const p = start[0] * u0 + start[1] * d0 + end[0] * uFree + end[1] * slopeFree + load;
      const q = start[2] * u0 + start[3] * d0 + end[2] * uFree + end[3] * slopeFree;
      w1 = solve[0] * p + solve[1] * q;
      s1 = solve[2] * p + solve[3] * q;
    }
    if (acts)
      for (let i = 0; i < n; i += 1) next[i] += gamma[i * COLUMNS + 2] * w1 + gamma[i * COLUMNS + 3] * s1;
    this.z = next;
    this.next = z;
    for (let k = 0; k < 4; k += 1) now[k] = dot(readings[k].z, next);
    this.write(index, 1, w1, s1 / stepS);
    this.position = to;
    return even;
  }

  /** Does the cubic with these ends meet the delayed output half way? */
  private isEven(w0: number, s0: number, w1: number, s1: number, middleS: number): boolean {
    const { history, setup } = this;
    const { piece } = history;
    history.after(middleS);
    const miss = Math.abs(history.value + setup.load - 0.5 * (w0 + w1) - 0.125 * (s0 - s1));
    history.piece = piece;
    return miss <= U_ERROR * Math.max(this.peakU, setup.uFloor);
  }

  /** Signals at one end of a piece, for an input w that changes by dw per second. */
  private write(index: number, end: 0 | 1, w: number, dw: number): void {
    const { trajectory, now, readings } = this;
    const [y, dy, u, du] = readings;
    const yValue = now[0] + y.w * w + y.one;
    const ySlope = now[1] + dy.w * w + y.w * dw + dy.one;
    const uValue = now[2] + u.w * w + u.one;
    const uSlope = now[3] + du.w * w + u.w * dw + du.one;
    if (end === 0) {
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

function dot(a: Float64Array, b: Float64Array): number {
  let sum = 0;
  for (let i = 0; i < a.length; i += 1) sum += a[i] * b[i];
  return sum;
}
