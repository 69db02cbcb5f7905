import type { LoopModel, Row } from './loop-model';
import type { Reading, StateSpace } from './state-space';

export type StepKind = 'setpoint' | 'load';

/** Set-point and load of both responses; constant input k of a free space belongs to response k. */
export const EXCITATIONS: readonly { kind: StepKind; r: number; load: number }[] = [
  { kind: 'setpoint', r: 1, load: 0 },
  { kind: 'load', r: 0, load: 1 },
];

function scaledRow(row: Float64Array, factor: number): Float64Array {
  return row.map((value) => value * factor);
}

function sum(a: Float64Array, b: Float64Array): Float64Array {
  return a.map((value, i) => value + b[i]);
}

/** The loop cut open at the plant's input, its output not limited. The load comes with w. */
export function openSpace(model: LoopModel): StateSpace {
  const { n, timeUnitS, a, bw, br } = model;
  const reading = (row: Row): Reading => ({
    z: row.z,
    w: row.w,
    ones: EXCITATIONS.map(({ r }) => row.r * r),
  });
  const constants = EXCITATIONS.map(({ r }) => scaledRow(br, r));
  return { n, timeUnitS, a, bw, constants, y: reading(model.y), v: reading(model.v) };
}

/**
 * The loop closed without dead time, w = v + load. A direct path through plant and controller makes an algebraic loop,
 * solved here: w = (v's part of the states and r, plus the load)/(1 − direct path).
 */
export function closedSpace(model: LoopModel): StateSpace {
  const { n, timeUnitS, a, bw, br, v } = model;
  const gain = 1 / (1 - v.w);
  const closed = new Float64Array(a);
  for (let i = 0; i < n; i += 1) for (let j = 0; j < n; j += 1) closed[i * n + j] += bw[i] * gain * v.z[j];
  const inputs = EXCITATIONS.map(({ r, load }) => gain * (v.r * r + load));
  const reading = (row: Row): Reading => ({
    z: row.z.map((value, i) => value + row.w * gain * v.z[i]),
    w: 0,
    ones: EXCITATIONS.map(({ r }, k) => row.r * r + row.w * inputs[k]),
  });
  const constants = EXCITATIONS.map(({ r }, k) => sum(scaledRow(br, r), scaledRow(bw, inputs[k])));
  return { n, timeUnitS, a: closed, bw: null, constants, y: reading(model.y), v: reading(model.v) };
}

/**
 * The loop while its output is held at a limit us: the integral is led back by (us − v)/Tt. One constant input for
 * each response and limit: index = response·limits.length + limit.
 */
export function heldSpace(
  model: LoopModel,
  limits: readonly number[],
  trackingTimeS: number,
  delayed: boolean,
): StateSpace {
  const { n, timeUnitS, bw, br, v, integral } = model;
  const back = scaledRow(integral, Number.isFinite(trackingTimeS) ? timeUnitS / trackingTimeS : 0);
  const a = new Float64Array(model.a);
  for (let i = 0; i < n; i += 1) for (let j = 0; j < n; j += 1) a[i * n + j] -= back[i] * v.z[j];
  const input = sum(bw, scaledRow(back, -v.w));
  const cases = EXCITATIONS.flatMap(({ r, load }) => limits.map((held) => ({ r, held, w: held + load })));
  const constants = cases.map(({ r, held, w }) => {
    const fixed = sum(scaledRow(br, r), scaledRow(back, held - v.r * r));
    return delayed ? fixed : sum(fixed, scaledRow(input, w));
  });
  const reading = (row: Row): Reading => ({
    z: row.z,
    w: delayed ? row.w : 0,
    ones: cases.map(({ r, w }) => row.r * r + (delayed ? 0 : row.w * w)),
  });
  return {
    n,
    timeUnitS,
    a,
    bw: delayed ? input : null,
    constants,
    y: reading(model.y),
    v: reading(model.v),
  };
}

/** Plant and measurement filter alone, driven by w: for a controller that is computed from sample to sample. */
export function plantSpace(model: LoopModel): StateSpace {
  const { n, timeUnitS, a, bw, y, measured } = model;
  const reading = (row: Row): Reading => ({ z: row.z, w: row.w, ones: [0] });
  const constants = [new Float64Array(n)];
  return { n, timeUnitS, a, bw, constants, y: reading(y), v: reading(measured) };
}
