import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { multiply, scale } from '../../lib/control/polynomial';
import { recognisePlant, type PlantShape } from '../../lib/control/reduction/recognise';

/** Expected parameters come from the factored form that each plant is multiplied out from. */
function product(...factors: number[][]): number[] {
  return factors.reduce((p, q) => multiply(p, q), [1]);
}

function expectShape(num: number[], den: number[], deadTimeS: number, expected: PlantShape, digits = 12) {
  const found = recognisePlant({ num, den, deadTimeS }) as Record<string, unknown>;
  expect(Object.keys(found).sort()).toEqual(Object.keys(expected).sort());
  for (const [name, value] of Object.entries(expected)) {
    if (typeof value === 'number')
      expect(Number(found[name]) / (value || 1)).toBeCloseTo(value === 0 ? 0 : 1, digits);
    else expect(found[name]).toBe(value);
  }
}

describe('recognisePlant', () => {
  it('names the shapes of the rules, whatever the scaling of numerator and denominator', () => {
    const s = 2.7e-9;
    const at = (num: number[], den: number[], theta: number, shape: PlantShape) =>
      expectShape(scale(num, s), scale(den, s), theta, shape);
    at([3], [1], 2, { shape: 'gain', k: 3, theta: 2 });
    at([2], [5, 1], 2.5, { shape: 'first-order', k: 2, tau: 5, theta: 2.5 });
    at([-2], [5, 1], 0, { shape: 'first-order', k: -2, tau: 5, theta: 0 });
    at([1], product([10, 1], [5, 1]), 1, { shape: 'second-order-real', k: 1, tau1: 10, tau2: 5, theta: 1 });
    at([1], [1, 1, 1], 0.2, { shape: 'second-order-complex', k: 1, tau: 1, zeta: 0.5, theta: 0.2 });
    at([-0.2, 1], [1, 1, 1], 0, {
      shape: 'second-order-rhp-zero',
      k: 1,
      tau: 1,
      zeta: 0.5,
      beta: 0.2,
      theta: 0,
    });
    at([2], product([5, 1], [3, 1], [0.5, 1]), 0, {
      shape: 'third-order-real',
      k: 2,
      tau1: 5,
      tau2: 3,
      tau3: 0.5,
      theta: 0,
    });
    at([4], [1, 0], 1, { shape: 'integrator', k: 4, theta: 1 });
    at([2], [0.5, 1, 0], 0, { shape: 'integrator-lag', k: 2, tau: 0.5, theta: 0 });
    at([1], product([10, 1], [1, 1], [1, 0]), 0, {
      shape: 'integrator-two-lags',
      k: 1,
      tau1: 10,
      tau2: 1,
      theta: 0,
    });
    at([4, 1], product([2.5, 1], [1, 0]), 1, {
      shape: 'integrator-zero-lag',
      k: 1,
      tz: 4,
      tau2: 2.5,
      theta: 1,
    });
    at([100], [1, 0, 0], 0.002, { shape: 'double-integrator', k: 100, theta: 0.002 });
  });

  it('reads a plant in pole form: 2420/(s² + 118.8 s + 1936) has its poles at −19.51 and −99.29', () => {
    // Roots by the quadratic formula: 59.4 ± √(59.4² − 1936).
    const root = Math.sqrt(59.4 ** 2 - 1936);
    expectShape([2420], [1, 118.8, 1936], 0, {
      shape: 'second-order-real',
      k: 2420 / 1936,
      tau1: 1 / (59.4 - root),
      tau2: 1 / (59.4 + root),
      theta: 0,
    });
  });

  it('gives repeated lags as exactly repeated', () => {
    for (const tau of [1, 0.1, 0.3, 7.7, 1e-4, 3e5]) {
      const two = recognisePlant({ num: [1], den: product([tau, 1], [tau, 1]), deadTimeS: 0 });
      expect(two.shape === 'second-order-real' && two.tau1 === two.tau2).toBe(true);
      const three = recognisePlant({ num: [1], den: product([tau, 1], [tau, 1], [tau, 1]), deadTimeS: 0 });
      expect(three.shape === 'third-order-real' && three.tau1 === three.tau3).toBe(true);
      expectShape(
        [1],
        product([tau, 1], [tau, 1], [5 * tau, 1]),
        0,
        {
          shape: 'third-order-real',
          k: 1,
          tau1: 5 * tau,
          tau2: tau,
          tau3: tau,
          theta: 0,
        },
        6,
      );
    }
  });

  it('finds any three separate lags', () => {
    fc.assert(
      fc.property(
        fc.tuple(
          fc.double({ min: 1.5, max: 1e3, noNaN: true }),
          fc.double({ min: 1.5, max: 1e3, noNaN: true }),
        ),
        fc.double({ min: 1e-4, max: 1e4, noNaN: true }),
        ([r1, r2], tau1) => {
          const [tau2, tau3] = [tau1 / r1, tau1 / r1 / r2];
          expectShape(
            [1],
            product([tau1, 1], [tau2, 1], [tau3, 1]),
            0,
            { shape: 'third-order-real', k: 1, tau1, tau2, tau3, theta: 0 },
            8,
          );
        },
      ),
      { numRuns: 300 },
    );
  });

  it('cancels a factor s common to both, but no other', () => {
    expectShape([2, 0], [5, 1, 0], 1, { shape: 'first-order', k: 2, tau: 5, theta: 1 });
    expect(recognisePlant({ num: [1, 1], den: [1, 2, 1], deadTimeS: 0 }).shape).toBe('general');
  });

  it('leaves unstable, undamped, differentiating and higher-order plants general', () => {
    const shapeOf = (num: number[], den: number[]) => recognisePlant({ num, den, deadTimeS: 0 }).shape;
    expect(shapeOf([1], [1, -1])).toBe('general');
    expect(shapeOf([1], [1, 0, 1])).toBe('general');
    expect(shapeOf([1], [1, -0.1, 1])).toBe('general');
    expect(shapeOf([1, 0], [1, 1])).toBe('general');
    expect(shapeOf([0.3, 1], [1, 1])).toBe('general');
    expect(shapeOf([1], [1, 4, 6, 4, 1])).toBe('general');
    expect(shapeOf([1], [1, 0, 0, 0])).toBe('general');
    expect(shapeOf([1], [1, 0.2, 1, 0])).toBe('general');
    expect(shapeOf([0], [1, 1])).toBe('general');
  });
});
