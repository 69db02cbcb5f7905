import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { loopCurve } from '@/lib/control/frequency/curve';
import { unitGainCrossings } from '@/lib/control/frequency/crossings';
import { scaledLoop } from '@/lib/control/frequency/scaled-loop';
import { openLoop } from '@/lib/control/loop';
import { analyseLoop } from '@/lib/control/margins';
import { add, multiply } from '@/lib/control/polynomial';
import { roots } from '@/lib/control/roots';
import { isHurwitz, isStable, stableByCount } from '@/lib/control/stability';
import { idealController, type IdealController, type Plant } from '@/lib/control/types';

const plant = (num: number[], den: number[], deadTimeS = 0): Plant => ({ num, den, deadTimeS });
const P = (kp: number) => idealController({ kp });
const times = (controller: IdealController, factor: number) => ({
  ...controller,
  kp: controller.kp * factor,
});

/** Factors of first and second order, stable or not, from 1/30 to 30 rad/s, damping from 0.02. */
const size = fc.integer({ min: -30, max: 30 }).map((k) => 10 ** (k / 20));
const sign = fc.constantFrom(1, 1, 1, -1);
const lag = fc.tuple(size, sign).map(([w, side]) => [1, side * w]);
const pair = fc
  .tuple(size, fc.integer({ min: 1, max: 50 }), sign)
  .map(([w, k, side]) => [1, (side * k * w) / 25, w * w]);
const integrator = fc.constant<number[]>([1, 0]);
const product = (factors: number[][]) => factors.reduce((p, q) => multiply(p, q), [1]);
const anyDen = fc.array(fc.oneof(lag, pair, integrator), { minLength: 1, maxLength: 4 }).map(product);
const anyNum = fc
  .tuple(size, fc.array(lag, { maxLength: 1 }))
  .map(([k, factors]) => product([[k], ...factors]));
const controller = fc
  .tuple(size, fc.option(size), fc.option(size), fc.constantFrom(2, 10, 100))
  .map(([kp, ti, td, n]) => idealController({ kp, ti: ti ?? Infinity, td: td ?? 0, n }));

describe('isHurwitz', () => {
  it.each([
    [[1], true],
    [[1, 1], true],
    [[-1, -3, -3, -1], true],
    [[1, 3, 3, 9], false], // 1/(s + 1)³ at its ultimate gain 8: a pair on the axis
    [[1, 0, 1], false],
    [[1, -1], false],
    [[1, 1, 0], false],
    [[1, 1, 1, 5, 1], false],
  ])('%j is %s', (p, stable) => expect(isHurwitz(p)).toBe(stable));

  it('agrees with the roots', () => {
    fc.assert(
      fc.property(anyDen, (p) => {
        const rightmost = Math.max(...roots(p).map((z) => z.re / (Math.hypot(z.re, z.im) || 1)));
        fc.pre(Math.abs(rightmost) > 1e-9 || rightmost === 0);
        expect(isHurwitz(p)).toBe(rightmost < 0);
      }),
      { numRuns: 1000, seed: 1 },
    );
  });
});

describe('isStable without dead time', () => {
  it('agrees with the closed-loop poles, and so does the Nyquist count', () => {
    let counted = 0;
    fc.assert(
      fc.property(anyNum, anyDen, controller, (num, den, c) => {
        fc.pre(num.length <= den.length);
        const g = plant(num, den);
        const loop = openLoop(g, c);
        const atInfinity = loop.num.length === loop.den.length ? loop.num[0] / loop.den[0] : 0;
        fc.pre(atInfinity > -0.999);
        const closed = add(loop.den, loop.num);
        fc.pre(Math.abs(closed[closed.length - 1]) > 1e-9 * Math.abs(loop.den[loop.den.length - 1]));
        const poles = roots(closed);
        const rightmost = Math.max(...poles.map((z) => z.re / Math.hypot(z.re, z.im)));
        fc.pre(Math.abs(rightmost) > 1e-6);
        expect(isStable(g, c)).toBe(rightmost < 0);
        const scaled = scaledLoop(g, c);
        if (scaled === null) return;
        expect(stableByCount(scaled, unitGainCrossings(loopCurve(scaled)))).toBe(rightmost < 0);
        counted += rightmost < 0 ? 1 : 0;
      }),
      { numRuns: 2000, seed: 2 },
    );
    expect(counted).toBeGreaterThan(100);
  });

  it('counts 1 + L(∞) ≤ 0 as unstable', () => {
    expect(isStable(plant([-1, 1], [1, 1]), P(0.99))).toBe(true);
    expect(isStable(plant([-1, 1], [1, 1]), P(1))).toBe(false);
    expect(isStable(plant([-1, 1], [1, 1]), P(1.01))).toBe(false);
  });

  it('counts modes that the controller cancels', () => {
    expect(isStable(plant([1, -1], [1, 0, -1]), P(1))).toBe(false);
    expect(isStable(plant([1, 0], [1, 2, 1]), idealController({ kp: 1, ti: 1 }))).toBe(false);
    expect(isStable(plant([1, 0], [1, 2, 1], 0.1), idealController({ kp: 1, ti: 1 }))).toBe(false);
  });
});

describe('isStable with dead time', () => {
  it.each([0.01, 0.3, 1, 10, 300])(
    'finds the limit of a first-order lag within 0.1 percent at θ/τ = %d',
    (theta) => {
      // w·θ + atan(w) = π by bisection; the gain there is √(1 + w²).
      let [low, high] = [0, Math.PI / theta];
      for (let i = 0; i < 200; i += 1) {
        const middle = (low + high) / 2;
        if (middle * theta + Math.atan(middle) < Math.PI) low = middle;
        else high = middle;
      }
      const ultimate = Math.hypot(1, low);
      expect(isStable(plant([1], [1, 1], theta), P(ultimate * 0.9999))).toBe(true);
      expect(isStable(plant([1], [1, 1], theta), P(ultimate * 1.0001))).toBe(false);
      // The lag unstable: 1/(s - 1) needs a gain above 1.
      expect(isStable(plant([1], [1, -1], theta), P(0.999))).toBe(false);
      expect(isStable(plant([1], [1, -1], theta), P(1.001))).toBe(theta < 1);
    },
  );

  it('finds the limit of an integrator: k·θ = π/2', () => {
    expect(isStable(plant([1], [1, 0], 2), P((Math.PI / 4) * 0.9999))).toBe(true);
    expect(isStable(plant([1], [1, 0], 2), P((Math.PI / 4) * 1.0001))).toBe(false);
  });

  it('follows the windows of an undamped oscillator', () => {
    // s² + 1 + k·e^(-θs), k small: the root near j moves by k·(sin θ + j·cos θ)/2, so it is stable where sin θ < 0.
    for (const theta of [0.5, 1, 2, 3, 3.5, 4, 5, 6, 6.5, 8, 9, 10, 11, 12])
      expect(isStable(plant([0.01], [1, 0, 1], theta), P(1)), `θ = ${theta}`).toBe(Math.sin(theta) < 0);
  });

  it('knows neutral loops: a gain of 1 or more at infinity is unstable', () => {
    expect(isStable(plant([1], [1], 3), P(0.999))).toBe(true);
    expect(isStable(plant([1], [1], 3), P(1))).toBe(false);
    expect(isStable(plant([0.5, 1], [1, 1], 1e-3), P(1.9))).toBe(true);
    expect(isStable(plant([0.5, 1], [1, 1], 1e-3), P(2.1))).toBe(false);
  });

  it('turns at the gain margins and at the delay margin', () => {
    let checked = 0;
    fc.assert(
      fc.property(anyNum, anyDen, controller, size, (num, den, c, deadTime) => {
        fc.pre(num.length <= den.length);
        const g = plant(num, den, deadTime / 100);
        const { stable, margins } = analyseLoop(g, c);
        if (!stable) return;
        checked += 1;
        const { gainMargin, gainMarginLow, delayMarginS } = margins;
        const longer = (share: number) => ({ ...g, deadTimeS: g.deadTimeS + (delayMarginS ?? 0) * share });
        if (gainMargin < Infinity) {
          expect(isStable(g, times(c, 1 + (gainMargin - 1) * 0.999))).toBe(true);
          expect(isStable(g, times(c, gainMargin * 1.0001))).toBe(false);
        } else expect(isStable(g, times(c, 1e3))).toBe(true);
        if (gainMarginLow > 0) {
          expect(isStable(g, times(c, 1 - (1 - gainMarginLow) * 0.999))).toBe(true);
          expect(isStable(g, times(c, gainMarginLow * 0.9999))).toBe(false);
        }
        if (delayMarginS === Infinity) return;
        expect(isStable(longer(0.999), c)).toBe(true);
        expect(isStable(longer(1.0001), c)).toBe(false);
      }),
      { numRuns: 3000, seed: 3 },
    );
    expect(checked).toBeGreaterThan(100);
  });
});
