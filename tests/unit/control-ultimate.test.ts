import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { multiply } from '@/lib/control/polynomial';
import { isStable } from '@/lib/control/stability';
import { idealController, type Plant } from '@/lib/control/types';
import { ultimatePoint } from '@/lib/control/ultimate';

const plant = (num: number[], den: number[], deadTimeS = 0): Plant => ({ num, den, deadTimeS });

function expectPoint(given: Plant, ku: number, wu: number): void {
  const point = ultimatePoint(given);
  if (!point.ok) throw new Error(point.message);
  expect(point.value.ku / ku).toBeCloseTo(1, 11);
  expect(point.value.wu / wu).toBeCloseTo(1, 11);
  expect(point.value.tu).toBeCloseTo((2 * Math.PI) / point.value.wu, 11);
}

describe('ultimatePoint', () => {
  it('integrator with dead time: ku = π/(2kθ), wu = π/(2θ)', () => {
    expectPoint(plant([0.5], [1, 0], 2), Math.PI / 2, Math.PI / 4);
  });

  it('three equal lags: ku = 8 and wu = √3', () => {
    expectPoint(plant([1], [1, 3, 3, 1]), 8, Math.sqrt(3));
  });

  it('(1 - s)/(1 + s)²: phase -3·atan w, ku = 2', () => {
    expectPoint(plant([-1, 1], [1, 2, 1]), 2, Math.sqrt(3));
  });

  it('pure dead time: ku = 1, wu = π/θ', () => {
    expectPoint(plant([4], [1], 2), 0.25, Math.PI / 2);
  });

  it('negative plant: negative gain, the same period', () => {
    expectPoint(plant([-1], [1, 3, 3, 1]), -8, Math.sqrt(3));
    expectPoint(plant([1], [-1, -3, -3, -1]), -8, Math.sqrt(3));
  });

  it('first order with dead time satisfies wθ + atan(wτ) = π and ku·K = √(1 + (wτ)²)', () => {
    fc.assert(
      fc.property(
        fc.double({ min: -3, max: 3, noNaN: true }),
        fc.double({ min: -3, max: 3, noNaN: true }),
        (a, b) => {
          const [tau, theta] = [10 ** a, 10 ** b];
          const point = ultimatePoint(plant([2], [tau, 1], theta));
          if (!point.ok) throw new Error(point.message);
          const { ku, wu } = point.value;
          expect(wu * theta + Math.atan(wu * tau)).toBeCloseTo(Math.PI, 11);
          expect((ku * 2) / Math.hypot(1, wu * tau)).toBeCloseTo(1, 11);
        },
      ),
    );
  });

  it('is the border of stability for lags, zeros and dead time', () => {
    const lag = fc.integer({ min: -20, max: 20 }).map((k) => [10 ** (k / 10), 1]);
    fc.assert(
      fc.property(
        fc.array(lag, { minLength: 3, maxLength: 7 }),
        fc.integer({ min: 0, max: 30 }),
        (lags, delay) => {
          const given = plant(
            [1],
            lags.reduce((p, q) => multiply(p, q), [1]),
            delay / 10,
          );
          const point = ultimatePoint(given);
          if (!point.ok) throw new Error(point.message);
          expect(isStable(given, idealController({ kp: point.value.ku * 0.9999 }))).toBe(true);
          expect(isStable(given, idealController({ kp: point.value.ku * 1.0001 }))).toBe(false);
        },
      ),
    );
  });

  it('takes the upper limit of an unstable plant, whose lower one does not oscillate', () => {
    const given = plant([1], [1, -1], 0.3);
    const point = ultimatePoint(given);
    if (!point.ok) throw new Error(point.message);
    const { ku, wu } = point.value;
    // -(π - atan w) - 0.3·w = -π and ku = √(1 + w²).
    expect(Math.atan(wu) - 0.3 * wu).toBeCloseTo(0, 11);
    expect(ku).toBeCloseTo(Math.hypot(1, wu), 11);
  });

  it.each([
    ['first order', plant([1], [1, 1])],
    ['second order', plant([1], [1, 2, 1])],
    ['integrator', plant([1], [1, 0])],
    ['unstable first order', plant([1], [1, -1])],
    ['all-pass: its limit is at infinity', plant([-1, 1], [1, 1])],
    ['no gain at all', plant([0], [1, 1])],
  ])('says that there is none: %s', (_, given) => {
    expect(ultimatePoint(given)).toMatchObject({ ok: false, code: 'NO_ULTIMATE_POINT' });
  });

  it.each([
    ['double integrator', plant([1], [1, 0, 0])],
    ['double integrator with dead time', plant([1], [1, 0, 0], 1)],
    ['undamped oscillator', plant([1], [1, 0, 1])],
    ['unstable lag with more dead time than its time constant', plant([1], [1, -1], 1.5)],
    ['three unstable lags', plant([1], [1, -3, 3, -1])],
  ])('says that no gain stabilises: %s', (_, given) => {
    expect(ultimatePoint(given)).toMatchObject({ ok: false, code: 'NO_STABLE_GAIN' });
  });
});
