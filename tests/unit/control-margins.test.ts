import { describe, expect, it } from 'vitest';
import { analyseLoop, computeMargins } from '@/lib/control/margins';
import { idealController, type Margins } from '@/lib/control/types';

/** Closed-form cases; each formula follows from L(jw) in two lines, none is taken from this project's code. */
const DEGREES = 180 / Math.PI;
const plant = (num: number[], den: number[], deadTimeS = 0) => ({ num, den, deadTimeS });
const P = (kp: number) => idealController({ kp });

function expectMargins(got: Margins, wanted: Partial<Record<keyof Margins, number | null>>): void {
  for (const [name, value] of Object.entries(wanted)) {
    const figure = got[name as keyof Margins];
    if (value === null || value === 0 || !Number.isFinite(value)) expect(figure, name).toBe(value);
    else
      expect(Math.abs((figure ?? NaN) / value - 1), `${name}: got ${figure}, want ${value}`).toBeLessThan(
        1e-11,
      );
  }
}

describe('margins in closed form', () => {
  it('integrator with dead time under P: L = k·e^(-θs)/s', () => {
    const [k, theta] = [0.7, 1.3];
    expectMargins(computeMargins(plant([k], [1, 0], theta), P(1)), {
      gainMargin: Math.PI / (2 * k * theta),
      gainMarginLow: 0,
      phaseCrossover: Math.PI / (2 * theta),
      phaseMarginDeg: 90 - k * theta * DEGREES,
      gainCrossover: k,
      delayMarginS: Math.PI / (2 * k) - theta,
    });
  });

  it('first order with dead time under PI with ti = τ is the same loop', () => {
    const [gain, tau, theta, kp] = [2, 5, 2.5, 0.6];
    const k = (gain * kp) / tau;
    expectMargins(computeMargins(plant([gain], [tau, 1], theta), idealController({ kp, ti: tau })), {
      gainMargin: Math.PI / (2 * k * theta),
      phaseMarginDeg: 90 - k * theta * DEGREES,
      gainCrossover: k,
    });
  });

  it('three equal lags under P: GM = 8/k at √3', () => {
    const k = 3;
    const gainCrossover = Math.sqrt(k ** (2 / 3) - 1);
    expectMargins(computeMargins(plant([1], [1, 3, 3, 1]), P(k)), {
      gainMargin: 8 / k,
      gainMarginDb: 20 * Math.log10(8 / k),
      phaseCrossover: Math.sqrt(3),
      phaseMarginDeg: 180 - 3 * Math.atan(gainCrossover) * DEGREES,
      gainCrossover,
    });
  });

  it('second-order prototype wn²/(s(s + 2ζwn))', () => {
    const [zeta, wn] = [0.35, 4];
    const ratio = Math.sqrt(Math.sqrt(1 + 4 * zeta ** 4) - 2 * zeta ** 2);
    expectMargins(computeMargins(plant([wn ** 2], [1, 2 * zeta * wn, 0]), P(1)), {
      gainMargin: Infinity,
      phaseCrossover: null,
      gainCrossover: wn * ratio,
      phaseMarginDeg: Math.atan((2 * zeta) / ratio) * DEGREES,
      mt: 1 / (2 * zeta * Math.sqrt(1 - zeta ** 2)),
    });
  });

  it('pure dead time under P never crosses unit gain', () => {
    expectMargins(computeMargins(plant([1], [1], 2), P(0.4)), {
      gainMargin: 2.5,
      phaseCrossover: Math.PI / 2,
      phaseMarginDeg: Infinity,
      gainCrossover: null,
      delayMarginS: Infinity,
      ms: 1 / 0.6,
      msFrequency: Math.PI / 2,
      mt: 0.4 / 0.6,
      mtFrequency: Math.PI / 2,
    });
  });

  it('all-pass (1 - s)/(1 + s): the limits are at infinity', () => {
    expectMargins(computeMargins(plant([-1, 1], [1, 1]), P(0.5)), {
      gainMargin: 2,
      phaseCrossover: Infinity,
      ms: 2,
      msFrequency: Infinity,
      mt: 1,
      mtFrequency: Infinity,
    });
  });

  it('unstable first order k/(s - 1): the lower gain limit is at w = 0', () => {
    const k = 3;
    expectMargins(computeMargins(plant([1], [1, -1]), P(k)), {
      gainMargin: Infinity,
      gainMarginLow: 1 / k,
      phaseCrossoverLow: 0,
      gainCrossover: Math.sqrt(k ** 2 - 1),
      phaseMarginDeg: Math.atan(Math.sqrt(k ** 2 - 1)) * DEGREES,
      mt: k / (k - 1),
      mtFrequency: 0,
    });
  });

  it('a loop that never amplifies: Ms = 1 at infinity', () => {
    expectMargins(computeMargins(plant([1], [1, 1]), P(0.5)), { ms: 1, msFrequency: Infinity, mt: 1 / 3 });
  });

  it('a loop gain of 1 or more at infinity has no delay margin', () => {
    expectMargins(computeMargins(plant([2, 1], [1, 1]), P(1)), {
      delayMarginS: 0,
      delayMarginFrequency: Infinity,
    });
  });

  it('negative plant with negative gain is the positive loop', () => {
    const positive = analyseLoop(plant([2], [3, 1], 0.5), idealController({ kp: 1.4, ti: 2.5 }));
    const negative = analyseLoop(plant([-2], [3, 1], 0.5), idealController({ kp: -1.4, ti: 2.5 }));
    expect(negative).toEqual(positive);
  });

  it('time unit and coefficient scale change nothing but the unit', () => {
    const controller = (unit: number) => idealController({ kp: 1.4, ti: 2.5 * unit, td: 0.2 * unit });
    const scaled = (unit: number, size: number) =>
      computeMargins(plant([2 * size], [3 * unit * size, size], 0.5 * unit), controller(unit));
    const base = scaled(1, 1);
    for (const [unit, size] of [
      [1e-6, 1e9],
      [86400, 1e-9],
    ] as const)
      expectMargins(scaled(unit, size), {
        gainMargin: base.gainMargin,
        phaseMarginDeg: base.phaseMarginDeg,
        delayMarginS: (base.delayMarginS ?? NaN) * unit,
        gainCrossover: (base.gainCrossover ?? NaN) / unit,
        ms: base.ms,
        mt: base.mt,
      });
  });
});

describe('margins that are not defined', () => {
  it('an unstable loop has gain factors only', () => {
    const { stable, margins } = analyseLoop(plant([1], [1, 3, 3, 1]), P(10));
    expect(stable).toBe(false);
    expectMargins(margins, { gainMargin: Infinity, gainMarginLow: 0.8, phaseCrossoverLow: Math.sqrt(3) });
    expectMargins(margins, {
      phaseMarginDeg: null,
      gainCrossover: null,
      delayMarginS: null,
      ms: null,
      mt: null,
    });
  });

  it('a loop without gain is open', () => {
    const { stable, margins } = analyseLoop(plant([1], [1, 1], 1), P(0));
    expect(stable).toBe(true);
    expectMargins(margins, { gainMargin: Infinity, phaseMarginDeg: Infinity, ms: 1, mt: 0 });
  });

  it('refuses an ideal derivative on a plant without lag', () => {
    const ideal = idealController({ kp: 1, td: 1, n: Infinity });
    expect(() => analyseLoop(plant([1], [1], 1), ideal)).toThrow(/more zeros than poles/);
    expect(() => analyseLoop(plant([1, 1], [1]), P(1))).toThrow(/degree of num/);
    expect(() => analyseLoop(plant([1], [1, 1], -1), P(1))).toThrow(/deadTimeS/);
    expect(() => analyseLoop(plant([1], [1, 1]), idealController({ kp: 1, ti: 0 }))).toThrow(/ti must be/);
  });
});
