import { add, trimmed } from '../../control/polynomial';
import { openLoop } from '../../control/loop';
import { roots } from '../../control/roots';
import type { IdealController, Plant } from '../../control/types';
import { Trajectory } from '../metrics';
import { balanced, closedModel, loopModel, type ClosedModel, type LoopModel } from './loop-model';
import { exponential } from './matrix';

/** A mode counts until it has died away to e^-20 of its size. */
const ALIVE = 20;
/** Step times the frequency of the fastest mode alive: the cubic between steps is then off by 1e-6 of it. */
const RESOLUTION = 0.12;
const LEAST_STEPS = 1200;
const MOST_STEPS = 2_000_000;

export type StepKind = 'setpoint' | 'load';

interface Segment {
  readonly steps: number;
  readonly stepS: number;
}

/** Closed-loop poles, rad/s; dead time is left out. */
export function closedLoopPoles(plant: Plant, controller: IdealController): { re: number; im: number }[] {
  const { num, den } = openLoop(plant, controller);
  const characteristic = trimmed(add(num, den));
  return characteristic.length > 1 ? [...roots(characteristic)] : [];
}

/** Steps that follow each mode while it is alive, and are longer once the fast ones have died away. */
function segments(poles: readonly { re: number; im: number }[], horizonS: number): Segment[] {
  const modes = poles.map(({ re, im }) => ({
    size: Math.hypot(re, im),
    until: re < 0 ? Math.min(horizonS, ALIVE / -re) : horizonS,
  }));
  const ends = [...new Set([...modes.map(({ until }) => until), horizonS])].sort((p, q) => p - q);
  const result: Segment[] = [];
  let from = 0;
  for (const to of ends) {
    const length = to - from;
    if (length <= 1e-12 * horizonS) continue;
    const fastest = Math.max(0, ...modes.filter(({ until }) => until > from).map(({ size }) => size));
    const wanted = Math.min(horizonS / LEAST_STEPS, fastest > 0 ? RESOLUTION / fastest : horizonS);
    const steps = Math.min(MOST_STEPS, Math.max(1, Math.ceil(length / wanted)));
    result.push({ steps, stepS: length / steps });
    from = to;
  }
  return result;
}

/** One step of ż = A z + b as a matrix and a vector, exact for any length. */
function stepMatrices(closed: ClosedModel, input: Float64Array, length: number) {
  const { n, a } = closed;
  const m = n + 1;
  const augmented = new Float64Array(m * m);
  for (let i = 0; i < n; i += 1) {
    for (let j = 0; j < n; j += 1) augmented[i * m + j] = a[i * n + j] * length;
    augmented[i * m + n] = input[i] * length;
  }
  const full = exponential(augmented, m);
  const phi = new Float64Array(n * n);
  const gamma = new Float64Array(n);
  for (let i = 0; i < n; i += 1) {
    for (let j = 0; j < n; j += 1) phi[i * n + j] = full[i * m + j];
    gamma[i] = full[i * m + n];
  }
  return { phi, gamma };
}

function dot(a: Float64Array, b: Float64Array): number {
  let sum = 0;
  for (let i = 0; i < a.length; i += 1) sum += a[i] * b[i];
  return sum;
}

/** y and u of a state: factors over z, and a constant. */
interface Output {
  readonly z: Float64Array;
  readonly constant: number;
}

function outputs(model: LoopModel, closed: ClosedModel, kind: StepKind): { y: Output; u: Output } {
  const r = kind === 'setpoint' ? 1 : 0;
  const load = 1 - r;
  const w = closed.wr * r + closed.wl * load;
  const read = (row: LoopModel['y']): Output => ({
    z: row.z.map((value, i) => value + row.w * closed.wz[i]),
    constant: row.w * w + row.r * r,
  });
  return { y: read(model.y), u: read(model.u) };
}

/** The response of a loop without dead time: exact at every step, whatever its length. */
export function respondWithoutDeadTime(
  plant: Plant,
  controller: IdealController,
  kind: StepKind,
  horizonS: number,
): Trajectory {
  const open = loopModel(plant, controller, horizonS);
  const model = balanced(open, closedModel(open).a);
  const closed = closedModel(model);
  const { n, timeUnitS } = model;
  const input = kind === 'setpoint' ? closed.br : closed.bl;
  const { y, u } = outputs(model, closed, kind);
  const parts = segments(closedLoopPoles(plant, controller), horizonS);
  const trajectory = new Trajectory(parts.reduce((sum, { steps }) => sum + steps, 0));
  let z = new Float64Array(n);
  let next = new Float64Array(n);
  const slope = new Float64Array(n);
  const slopes = () => {
    for (let i = 0; i < n; i += 1) {
      let sum = input[i];
      for (let j = 0; j < n; j += 1) sum += closed.a[i * n + j] * z[j];
      slope[i] = sum / timeUnitS;
    }
  };
  slopes();
  let y0 = dot(y.z, z) + y.constant;
  let u0 = dot(u.z, z) + u.constant;
  let dy0 = dot(y.z, slope);
  let du0 = dot(u.z, slope);
  let start = 0;
  for (const { steps, stepS } of parts) {
    const { phi, gamma } = stepMatrices(closed, input, stepS / timeUnitS);
    for (let k = 1; k <= steps; k += 1) {
      for (let i = 0; i < n; i += 1) {
        let sum = gamma[i];
        for (let j = 0; j < n; j += 1) sum += phi[i * n + j] * z[j];
        next[i] = sum;
      }
      [z, next] = [next, z];
      slopes();
      const index = trajectory.add(start + k * stepS);
      trajectory.y0[index] = y0;
      trajectory.dy0[index] = dy0;
      trajectory.u0[index] = u0;
      trajectory.du0[index] = du0;
      y0 = dot(y.z, z) + y.constant;
      u0 = dot(u.z, z) + u.constant;
      dy0 = dot(y.z, slope);
      du0 = dot(u.z, slope);
      trajectory.y1[index] = y0;
      trajectory.dy1[index] = dy0;
      trajectory.u1[index] = u0;
      trajectory.du1[index] = du0;
    }
    start += steps * stepS;
  }
  return trajectory;
}
