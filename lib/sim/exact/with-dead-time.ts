import { openLoop } from '../../control/loop';
import { evaluateComplex, trimmed } from '../../control/polynomial';
import { roots } from '../../control/roots';
import type { IdealController, Plant } from '../../control/types';
import { Trajectory } from '../metrics';
import { balanced, loopModel, type LoopModel } from './loop-model';
import { exponential } from './matrix';
import type { StepKind } from './without-dead-time';

/** Step times the fastest frequency: the cubic between steps is then off by some 1e-6 of the signal. */
const RESOLUTION = 0.12;
const LEAST_STEPS = 1200;
/** Beyond this the steps get coarser; the responses say so by their disagreement with the other engine. */
const MOST_STEPS = 1_000_000;
/** The loop moves nothing to speak of above the last frequency at which its gain is this. */
const ACTIVE_GAIN = 0.3;

/** The highest frequency at which the loop still answers, rad/s, between 1/horizon and 20/dead time. */
function activeFrequency(plant: Plant, controller: IdealController, horizonS: number): number {
  const { num, den } = openLoop(plant, controller);
  const high = 20 / plant.deadTimeS;
  const low = Math.min(1 / horizonS, high / 10);
  const steps = 160;
  for (let i = 0; i < steps; i += 1) {
    const w = high * (low / high) ** (i / steps);
    const [pRe, pIm] = evaluateComplex(num, 0, w);
    const [qRe, qIm] = evaluateComplex(den, 0, w);
    if (Math.hypot(pRe, pIm) >= ACTIVE_GAIN * Math.hypot(qRe, qIm)) return w;
  }
  return low;
}

/** Fastest pole of the loop cut open: what the signals do between two echoes of the dead time. */
function fastestOpenPole(plant: Plant, controller: IdealController): number {
  const { den } = openLoop(plant, controller);
  const poles = trimmed(den).length > 1 ? roots(trimmed(den)) : [];
  return Math.max(0, ...poles.map(({ re, im }) => Math.hypot(re, im)));
}

/** Steps in one dead time, so that every jump and kink that comes back after it falls on a step's end. */
function stepsPerDeadTime(plant: Plant, controller: IdealController, horizonS: number): number {
  const active = activeFrequency(plant, controller, horizonS);
  const fastest = Math.max(active, fastestOpenPole(plant, controller));
  const wanted = Math.max(horizonS / MOST_STEPS, Math.min(horizonS / LEAST_STEPS, RESOLUTION / fastest));
  return Math.max(1, Math.ceil(plant.deadTimeS / wanted));
}

interface StepMatrices {
  readonly phi: Float64Array;
  /** Factors of w, dw/dξ, d²w/dξ², d³w/dξ³ at the start of the step, ξ from 0 to 1 over it, and of r: n rows of 5. */
  readonly gamma: Float64Array;
}

/** One step of ż = A z + bw·w + br·r for an input w that is a cubic over the step: exact. */
function stepMatrices(model: LoopModel, length: number): StepMatrices {
  const { n, a, bw, br } = model;
  const m = n + 5;
  const augmented = new Float64Array(m * m);
  for (let i = 0; i < n; i += 1) {
    for (let j = 0; j < n; j += 1) augmented[i * m + j] = a[i * n + j] * length;
    augmented[i * m + n] = bw[i] * length;
    augmented[i * m + n + 4] = br[i] * length;
  }
  for (let k = 0; k < 3; k += 1) augmented[(n + k) * m + n + k + 1] = 1;
  const full = exponential(augmented, m);
  const phi = new Float64Array(n * n);
  const gamma = new Float64Array(n * 5);
  for (let i = 0; i < n; i += 1) {
    for (let j = 0; j < n; j += 1) phi[i * n + j] = full[i * m + j];
    for (let j = 0; j < 5; j += 1) gamma[i * 5 + j] = full[i * m + n + j];
  }
  return { phi, gamma };
}

/**
 * The response of a loop with dead time by the method of steps: what the controller put out one dead time ago drives
 * the plant. Steps divide the dead time; the delayed output is read back as the cubic of its own step.
 */
export function respondWithDeadTime(
  plant: Plant,
  controller: IdealController,
  kind: StepKind,
  horizonS: number,
): Trajectory {
  const open = loopModel(plant, controller, plant.deadTimeS);
  const model = balanced(open, open.a);
  const { n, timeUnitS } = model;
  const perDeadTime = stepsPerDeadTime(plant, controller, horizonS);
  const stepS = plant.deadTimeS / perDeadTime;
  const steps = Math.ceil(horizonS / stepS - 1e-9);
  const { phi, gamma } = stepMatrices(model, stepS / timeUnitS);
  const r = kind === 'setpoint' ? 1 : 0;
  const load = 1 - r;
  const trajectory = new Trajectory(steps);
  const run = new Stepper(model, r);
  for (let k = 0; k < steps; k += 1) {
    const from = k - perDeadTime;
    const there = from >= 0;
    const w0 = there ? trajectory.u0[from] + load : 0;
    const w1 = there ? trajectory.u1[from] + load : 0;
    const s0 = there ? stepS * trajectory.du0[from] : 0;
    const s1 = there ? stepS * trajectory.du1[from] : 0;
    const index = trajectory.add((k + 1) * stepS);
    run.read(w0, s0 / stepS);
    trajectory.y0[index] = run.y;
    trajectory.dy0[index] = run.dy;
    trajectory.u0[index] = run.u;
    trajectory.du0[index] = run.du;
    run.advance(phi, gamma, w0, s0, 2 * (3 * (w1 - w0) - 2 * s0 - s1), 6 * (2 * (w0 - w1) + s0 + s1), n);
    run.read(w1, s1 / stepS);
    trajectory.y1[index] = run.y;
    trajectory.dy1[index] = run.dy;
    trajectory.u1[index] = run.u;
    trajectory.du1[index] = run.du;
  }
  cutAt(trajectory, horizonS);
  return trajectory;
}

/** The state of the loop, and the signals read off it. */
class Stepper {
  y = 0;
  dy = 0;
  u = 0;
  du = 0;
  private z: Float64Array;
  private next: Float64Array;

  constructor(
    private readonly model: LoopModel,
    private readonly r: number,
  ) {
    this.z = new Float64Array(model.n);
    this.next = new Float64Array(model.n);
  }

  advance(
    phi: Float64Array,
    gamma: Float64Array,
    w: number,
    w1: number,
    w2: number,
    w3: number,
    n: number,
  ): void {
    const { z, next, r } = this;
    for (let i = 0; i < n; i += 1) {
      const g = i * 5;
      let sum = gamma[g] * w + gamma[g + 1] * w1 + gamma[g + 2] * w2 + gamma[g + 3] * w3 + gamma[g + 4] * r;
      for (let j = 0; j < n; j += 1) sum += phi[i * n + j] * z[j];
      next[i] = sum;
    }
    this.z = next;
    this.next = z;
  }

  /** Signals and their slopes per second for an input w that changes by dw per second. */
  read(w: number, dw: number): void {
    const { model, z, r } = this;
    const { n, a, bw, br, y, u, timeUnitS } = model;
    let yz = y.w * w + y.r * r;
    let uz = u.w * w + u.r * r;
    let dy = y.w * dw;
    let du = u.w * dw;
    for (let i = 0; i < n; i += 1) {
      let slope = bw[i] * w + br[i] * r;
      for (let j = 0; j < n; j += 1) slope += a[i * n + j] * z[j];
      slope /= timeUnitS;
      yz += y.z[i] * z[i];
      uz += u.z[i] * z[i];
      dy += y.z[i] * slope;
      du += u.z[i] * slope;
    }
    this.y = yz;
    this.u = uz;
    this.dy = dy;
    this.du = du;
  }
}

/** Ends the last piece at the horizon, its cubics cut there. */
function cutAt(trajectory: Trajectory, horizonS: number): void {
  const last = trajectory.count - 1;
  const from = trajectory.t[last];
  const h = trajectory.t[last + 1] - from;
  const x = (horizonS - from) / h;
  if (x >= 1 - 1e-12) {
    trajectory.t[last + 1] = horizonS;
    return;
  }
  const cut = (v0: Float64Array, d0: Float64Array, v1: Float64Array, d1: Float64Array) => {
    const [a, b] = [v0[last], h * d0[last]];
    const c = 3 * (v1[last] - a) - 2 * b - h * d1[last];
    const d = 2 * (a - v1[last]) + b + h * d1[last];
    v1[last] = a + x * (b + x * (c + x * d));
    d1[last] = (b + x * (2 * c + 3 * x * d)) / h;
  };
  cut(trajectory.y0, trajectory.dy0, trajectory.y1, trajectory.dy1);
  cut(trajectory.u0, trajectory.du0, trajectory.u1, trajectory.du1);
  trajectory.t[last + 1] = horizonS;
}
