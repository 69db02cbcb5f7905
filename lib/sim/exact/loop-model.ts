import { trimmed } from '../../control/polynomial';
import type { IdealController, Plant } from '../../control/types';
import { balancing } from './matrix';

/** A row of factors: what a signal is made of — the states, the plant's input w and the set-point r. */
export interface Row {
  readonly z: Float64Array;
  readonly w: number;
  readonly r: number;
}

/**
 * The loop cut open at the plant input w, as ż = A z + bw·w + br·r with the signals read off
 * the states. Time is in units of timeUnitS; the states are scaled so that A is balanced.
 */
export interface LoopModel {
  readonly n: number;
  readonly timeUnitS: number;
  readonly a: Float64Array;
  readonly bw: Float64Array;
  readonly br: Float64Array;
  /** Direction of the integral's state; zero without integral. */
  readonly integral: Float64Array;
  readonly y: Row;
  /** y behind the measurement filter. */
  readonly measured: Row;
  /** The controller output before its limits. */
  readonly v: Row;
}

/** The plant in observer form in the time unit: y is its first state plus direct·w. */
function plantRows(plant: Plant, timeUnitS: number) {
  const num = trimmed(plant.num);
  const den = trimmed(plant.den);
  const order = den.length - 1;
  const lead = den[0];
  const padded = [...new Array<number>(order + 1 - num.length).fill(0), ...num].map((c) => c / lead);
  const direct = padded[0];
  const a = den.slice(1).map((c, i) => (c / lead) * timeUnitS ** (i + 1));
  const b = padded.slice(1).map((c, i) => (c - (direct * den[i + 1]) / lead) * timeUnitS ** (i + 1));
  return { order, direct, a, b };
}

/** Time unit in which the plant's coefficients are of moderate size: one over the geometric mean of its poles. */
function timeUnitOf(plant: Plant, fallbackS: number): number {
  const den = trimmed(plant.den);
  const last = den.findLastIndex((c) => c !== 0);
  if (last === 0) return fallbackS;
  const mean = Math.abs(den[last] / den[0]) ** (1 / last);
  return Number.isFinite(mean) && mean > 0 ? 1 / mean : fallbackS;
}

/** Row algebra: sum += factor·row. */
function addRow(z: Float64Array, parts: { w: number; r: number }, row: Row, factor: number): void {
  for (let j = 0; j < z.length; j += 1) z[j] += factor * row.z[j];
  parts.w += factor * row.w;
  parts.r += factor * row.r;
}

/** Sets up the loop for a plant, its ideal-form controller and the measurement filter on y. */
export function loopModel(plant: Plant, controller: IdealController, fallbackTimeS: number): LoopModel {
  const { kp, ti, td, n: derivativeRatio, b, c, filter } = controller;
  const timeUnitS = timeUnitOf(plant, fallbackTimeS);
  const { order, direct, a: plantA, b: plantB } = plantRows(plant, timeUnitS);
  const hasIntegral = Number.isFinite(ti) && kp !== 0;
  const hasLag = td > 0;
  const filterOrder = filter && filter.timeConstantS > 0 ? filter.order : 0;
  const filterAt = order;
  const integralAt = filterAt + filterOrder;
  const lagAt = integralAt + (hasIntegral ? 1 : 0);
  const n = lagAt + (hasLag ? 1 : 0);

  const unit = (index: number): Row => {
    const z = new Float64Array(n);
    z[index] = 1;
    return { z, w: 0, r: 0 };
  };
  const y: Row = { z: order > 0 ? unit(0).z : new Float64Array(n), w: direct, r: 0 };
  const measured = filterOrder > 0 ? unit(filterAt) : y;

  const a = new Float64Array(n * n);
  const bw = new Float64Array(n);
  const br = new Float64Array(n);
  const setSlope = (state: number, terms: readonly (readonly [Row, number])[], setpoint = 0) => {
    const z = new Float64Array(n);
    const parts = { w: 0, r: setpoint };
    for (const [row, factor] of terms) addRow(z, parts, row, factor);
    a.set(z, state * n);
    bw[state] = parts.w;
    br[state] = parts.r;
  };
  for (let i = 0; i < order; i += 1) {
    setSlope(i, [[unit(0), -plantA[i]], ...(i + 1 < order ? ([[unit(i + 1), 1]] as const) : [])]);
    bw[i] += plantB[i];
  }
  if (filter && filterOrder > 0) {
    const rate = timeUnitS / filter.timeConstantS;
    if (filterOrder === 1)
      setSlope(filterAt, [
        [y, rate],
        [unit(filterAt), -rate],
      ]);
    else {
      // 1 + Tf s + (Tf s)²/2 with the second state Tf·dyf/dt.
      setSlope(filterAt, [[unit(filterAt + 1), rate]]);
      setSlope(filterAt + 1, [
        [y, 2 * rate],
        [unit(filterAt), -2 * rate],
        [unit(filterAt + 1), -2 * rate],
      ]);
    }
  }
  if (hasIntegral) setSlope(integralAt, [[measured, (-kp * timeUnitS) / ti]], (kp * timeUnitS) / ti);
  if (hasLag) {
    const rate = (derivativeRatio * timeUnitS) / td;
    setSlope(
      lagAt,
      [
        [measured, -rate],
        [unit(lagAt), -rate],
      ],
      rate * c,
    );
  }
  const uz = new Float64Array(n);
  const parts = { w: 0, r: kp * b };
  addRow(uz, parts, measured, -kp);
  if (hasIntegral) addRow(uz, parts, unit(integralAt), 1);
  if (hasLag) {
    parts.r += kp * derivativeRatio * c;
    addRow(uz, parts, measured, -kp * derivativeRatio);
    addRow(uz, parts, unit(lagAt), -kp * derivativeRatio);
  }
  const integral = new Float64Array(n);
  if (hasIntegral) integral[integralAt] = 1;
  return { n, timeUnitS, a, bw, br, integral, y, measured, v: { z: uz, ...parts } };
}

/** Scales the states of a model by powers of two so that a matrix is balanced; signals stay what they are. */
export function balanced(model: LoopModel, matrix: Float64Array): LoopModel {
  const { n } = model;
  const d = balancing(matrix, n);
  const a = new Float64Array(n * n);
  for (let i = 0; i < n; i += 1)
    for (let j = 0; j < n; j += 1) a[i * n + j] = (model.a[i * n + j] * d[j]) / d[i];
  const down = (values: Float64Array) => values.map((value, i) => value / d[i]);
  const up = (row: Row): Row => ({ ...row, z: row.z.map((value, i) => value * d[i]) });
  return {
    ...model,
    a,
    bw: down(model.bw),
    br: down(model.br),
    integral: down(model.integral),
    y: up(model.y),
    measured: up(model.measured),
    v: up(model.v),
  };
}
