import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { idealController, type Actuator, type IdealController, type Plant } from '../../lib/control/types';
import { simulateOde, type OdeResponses } from '../../lib/sim/ode';

/**
 * The odex engine against responses computed outside this repository (tests/reference/SOURCES.md): the stable ones of
 * 70 linear loops, and 12 loops with limits, each with a continuous and with a sampled controller.
 */
interface ReferenceController {
  Kp: number;
  Ti: number | null;
  Td: number;
  N: number;
  b: number;
  c: number;
}
type Figures = Record<string, number | null>;
interface Expected {
  stable?: boolean;
  setpoint: Figures;
  load: Figures;
}
interface Case {
  id: string;
  plant: { num: number[]; den: number[]; delay: number };
  controller: ReferenceController;
  filter?: { order: 1 | 2; Tf: number };
  limits?: { u_min: number; u_max: number; Tt: number };
  sampling?: { h: number };
  expect: Expected & { continuous?: Expected; sampled?: Expected };
}

const read = (name: string) =>
  (JSON.parse(readFileSync(new URL(name, import.meta.url), 'utf8')) as { cases: Case[] }).cases;

function plantOf({ plant }: Case): Plant {
  return { num: plant.num, den: plant.den, deadTimeS: plant.delay };
}

function controllerOf({ controller: k, filter }: Case): IdealController {
  return idealController({
    kp: k.Kp,
    ti: k.Ti ?? Infinity,
    td: k.Td,
    n: k.N,
    b: k.b,
    c: k.c,
    ...(filter ? { filter: { timeConstantS: filter.Tf, order: filter.order } } : {}),
  });
}

const SETPOINT = {
  yss: ['final', 1e-6],
  rise_time_10_90: ['riseTimeS', 2e-3],
  settling_time_2pct: ['settlingTimeS', 2e-3],
  IAE: ['iae', 1e-4],
  ISE: ['ise', 1e-4],
  ITAE: ['itae', 1e-4],
  u_max: ['controlPeak', 1e-4],
  TV_u: ['totalVariation', 1e-3],
} as const;
const LOAD = {
  y_peak: ['peak', 1e-4],
  recovery_time_2pct: ['recoveryTimeS', 2e-3],
  IAE: ['iae', 1e-4],
  y_final: ['final', 1e-6],
} as const;

function misses(got: OdeResponses, want: Expected): string[] {
  const found: string[] = [];
  const { horizon } = want.setpoint;
  const near = (
    name: string,
    value: number | null,
    reference: number | null,
    relative: number,
    floor = 0,
  ) => {
    if (reference === null) return;
    const allowed = Math.max(relative * Math.abs(reference), floor, 1e-9);
    if (value === null || !(Math.abs(value - reference) <= allowed))
      found.push(`${name}: ${value} for ${reference}`);
  };
  for (const [name, [field, tolerance]] of Object.entries(SETPOINT)) {
    near(
      `setpoint ${name}`,
      got.setpoint[field],
      want.setpoint[name],
      tolerance,
      /time/.test(name) ? 1e-4 * (horizon ?? 0) : 0,
    );
  }
  near('overshoot', got.setpoint.overshootPct, want.setpoint.overshoot_pct, 0, 0.02);
  near('peak time', got.setpoint.peakTimeS, want.setpoint.peak_time, 5e-3, 1e-4 * (horizon ?? 0));
  for (const [name, [field, tolerance]] of Object.entries(LOAD)) {
    near(
      `load ${name}`,
      got.load[field],
      want.load[name],
      tolerance,
      /time/.test(name) ? 1e-4 * (horizon ?? 0) : 0,
    );
  }
  return found;
}

describe('linear loops', () => {
  for (const loop of read('./loops-open.json').filter((c) => c.expect.stable)) {
    it(loop.id, () => {
      const horizonS = Number(loop.expect.setpoint.horizon);
      const got = simulateOde(plantOf(loop), controllerOf(loop), { horizonS });
      expect(misses(got, loop.expect)).toEqual([]);
    });
  }
});

describe('limited and sampled loops', () => {
  for (const loop of read('./nonlinear-open.json')) {
    for (const mode of ['continuous', 'sampled'] as const) {
      const want = loop.expect[mode];
      if (!want) continue;
      it(`${loop.id} ${mode}`, () => {
        const { limits, sampling } = loop;
        const actuator: Actuator = limits
          ? { low: limits.u_min, high: limits.u_max, trackingTimeS: limits.Tt }
          : {};
        const got = simulateOde(plantOf(loop), controllerOf(loop), {
          horizonS: Number(want.setpoint.horizon),
          actuator,
          ...(mode === 'sampled' ? { sampleTimeS: sampling?.h } : {}),
        });
        expect(misses(got, want)).toEqual([]);
      });
    }
  }
});
