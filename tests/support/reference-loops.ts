import { readFileSync } from 'node:fs';
import { idealController, type IdealController, type Plant } from '../../lib/control/types';
import type { LoadResponse, SetpointResponse } from '../../lib/sim/types';

/** Figures of one response as the reference files name them. */
type Figures = Record<string, number | null> & { horizon: number };

export interface ExpectedResponses {
  readonly setpoint: Figures;
  readonly load: Figures;
}

export interface ReferenceLoop {
  readonly id: string;
  readonly plant: { num: number[]; den: number[]; delay: number };
  readonly controller: {
    Kp: number;
    Ti: number | null;
    Td: number;
    N: number;
    b: number;
    c: number;
  };
  readonly filter?: { order: 1 | 2; Tf: number };
  readonly limits?: { u_min: number; u_max: number; Tt: number };
  readonly sampling?: { h: number };
  readonly expect: { stable?: boolean; setpoint: Figures | null; load: Figures | null } & {
    continuous?: ExpectedResponses;
    sampled?: ExpectedResponses;
  };
}

/** The loops of a file in tests/reference; what they are is told in SOURCES.md there. */
export function referenceLoops(file: string): ReferenceLoop[] {
  const text = readFileSync(new URL(`../reference/${file}`, import.meta.url), 'utf8');
  return (JSON.parse(text) as { cases: ReferenceLoop[] }).cases;
}

export function plantOf({ plant }: ReferenceLoop): Plant {
  return { num: plant.num, den: plant.den, deadTimeS: plant.delay };
}

export function controllerOf({ controller: k, filter }: ReferenceLoop): IdealController {
  const gains = { kp: k.Kp, ti: k.Ti ?? Infinity, td: k.Td, n: k.N, b: k.b, c: k.c };
  return idealController(
    filter ? { ...gains, filter: { timeConstantS: filter.Tf, order: filter.order } } : gains,
  );
}

/** Relative tolerances of a linear loop; times have 1e-4 of the horizon as floor. */
const AMPLITUDE = 1e-4;
const VARIATION = 1e-3;
const TIME = 2e-3;
const FINAL = 1e-6;
const OVERSHOOT_POINTS = 0.02;
const TIME_FLOOR = 1e-4;
/** Twelve printed digits of a figure of size 1. */
const PRINTED = 1e-11;

/** What differs from the reference by more than `factor` times the tolerance, one sentence each. */
export function differences(
  got: { setpoint: SetpointResponse; load: LoadResponse },
  want: ExpectedResponses,
  factor = 1,
): string[] {
  const found: string[] = [];
  const near = (name: string, value: number | null, reference: number | null, allowed: number) => {
    const same = value === null || reference === null ? value === reference : false;
    if (same || Math.abs(Number(value) - Number(reference)) <= factor * allowed + PRINTED) return;
    found.push(`${name}: ${value} for ${reference}`);
  };
  const relative = (name: string, value: number, reference: number | null, share: number) =>
    near(name, value, reference, share * Math.abs(reference ?? 0));
  const time = (name: string, value: number | null, reference: number | null) =>
    near(name, value, reference, Math.max(TIME * (reference ?? 0), TIME_FLOOR * horizon));
  const { setpoint: s, load: l } = want;
  const { horizon } = s;
  relative('yss', got.setpoint.final, s.yss, FINAL);
  near('overshoot', got.setpoint.overshootPct, s.overshoot_pct, OVERSHOOT_POINTS);
  time('peak time', got.setpoint.peakTimeS, s.peak_time);
  time('rise time', got.setpoint.riseTimeS, s.rise_time_10_90);
  time('settling time', got.setpoint.settlingTimeS, s.settling_time_2pct);
  relative('IAE', got.setpoint.iae, s.IAE, AMPLITUDE);
  relative('ISE', got.setpoint.ise, s.ISE, AMPLITUDE);
  relative('ITAE', got.setpoint.itae, s.ITAE, AMPLITUDE);
  relative('u max', got.setpoint.controlPeak, s.u_max, AMPLITUDE);
  relative('TV', got.setpoint.totalVariation, s.TV_u, VARIATION);
  relative('load peak', got.load.peak, l.y_peak, AMPLITUDE);
  time('load peak time', got.load.peakTimeS, l.t_peak);
  relative('load final', got.load.final, l.y_final, FINAL);
  time('recovery time', got.load.recoveryTimeS, l.recovery_time_2pct);
  relative('load IAE', got.load.iae, l.IAE, AMPLITUDE);
  return found;
}
