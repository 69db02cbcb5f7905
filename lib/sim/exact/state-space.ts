import type { ClosedModel, LoopModel, Row } from './loop-model';

/** A signal read off the loop: Σ z[i]·zᵢ + w·w + one. */
export interface Reading {
  readonly z: Float64Array;
  readonly w: number;
  readonly one: number;
}

/**
 * What a run steps through: ż = A z + bw·w + e with two signals read off it, in units of timeUnitS. w is what reaches
 * the plant after the dead time; e is constant.
 */
export interface StateSpace {
  readonly n: number;
  readonly timeUnitS: number;
  readonly a: Float64Array;
  readonly bw: Float64Array;
  readonly e: Float64Array;
  readonly y: Reading;
  readonly u: Reading;
}

function dot(a: Float64Array, b: Float64Array): number {
  let sum = 0;
  for (let i = 0; i < a.length; i += 1) sum += a[i] * b[i];
  return sum;
}

/** dx/dt per second of a signal: the part made of the states and w; a change of w itself comes on top. */
export function slopeReading(space: StateSpace, signal: Reading): Reading {
  const { n, a, bw, e, timeUnitS } = space;
  const z = new Float64Array(n);
  for (let i = 0; i < n; i += 1) {
    const factor = signal.z[i] / timeUnitS;
    if (factor !== 0) for (let j = 0; j < n; j += 1) z[j] += factor * a[i * n + j];
  }
  return { z, w: dot(signal.z, bw) / timeUnitS, one: dot(signal.z, e) / timeUnitS };
}

/** The loop cut open at the plant's input, for a set-point r. */
export function openSpace(model: LoopModel, r: number): StateSpace {
  const { n, timeUnitS, a, bw, br } = model;
  const reading = ({ z, w, r: one }: Row): Reading => ({ z, w, one: one * r });
  return { n, timeUnitS, a, bw, e: br.map((b) => b * r), y: reading(model.y), u: reading(model.u) };
}

/** The loop closed without dead time, for a set-point r and a load. */
export function closedSpace(model: LoopModel, closed: ClosedModel, r: number, load: number): StateSpace {
  const { n, timeUnitS } = model;
  const w = closed.wr * r + closed.wl * load;
  const reading = (row: Row): Reading => ({
    z: row.z.map((value, i) => value + row.w * closed.wz[i]),
    w: 0,
    one: row.w * w + row.r * r,
  });
  const e = closed.br.map((b, i) => b * r + closed.bl[i] * load);
  return {
    n,
    timeUnitS,
    a: closed.a,
    bw: new Float64Array(n),
    e,
    y: reading(model.y),
    u: reading(model.u),
  };
}
