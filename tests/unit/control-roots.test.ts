import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { multiply } from '@/lib/control/polynomial';
import { roots, type ComplexNumber } from '@/lib/control/roots';

/** Largest distance from a wanted root to the nearest found one, relative to its size; each found root is used once. */
function worstMiss(found: ComplexNumber[], wanted: ComplexNumber[]): number {
  const open = [...found];
  return wanted.reduce((worst, z) => {
    const distances = open.map((f) => Math.hypot(f.re - z.re, f.im - z.im));
    const nearest = distances.indexOf(Math.min(...distances));
    open.splice(nearest, 1);
    return Math.max(worst, distances[nearest] / Math.hypot(z.re, z.im));
  }, 0);
}

const real = (re: number): ComplexNumber => ({ re, im: 0 });
const fromReals = (values: number[]) => values.reduce<number[]>((p, r) => multiply(p, [1, -r]), [1]);

describe('roots', () => {
  it('has none for constants', () => {
    expect(roots([5])).toEqual([]);
    expect(roots([0, 0, 3])).toEqual([]);
    expect(roots([])).toEqual([]);
  });

  it('puts zeros at the origin exactly', () => {
    expect(roots([1, 3, 2, 0, 0]).slice(0, 2)).toEqual([real(0), real(0)]);
  });

  it('solves a quadratic without cancellation', () => {
    // x² - 1e8 x + 1: the small root is 1e-8·(1 + 1e-16 + …).
    expect(worstMiss(roots([1, -1e8, 1]), [real(1e8), real(1e-8)])).toBeLessThan(1e-15);
  });

  it('finds multiple roots to rounding', () => {
    // Binomial coefficients: (s + 1)^8, and ((s + 3)² + 4)².
    expect(
      worstMiss(
        roots([1, 8, 28, 56, 70, 56, 28, 8, 1]),
        Array.from({ length: 8 }, () => real(-1)),
      ),
    ).toBeLessThan(1e-14);
    const pair = [1, 6, 13];
    const twice = [-2, 2, -2, 2].map((im) => ({ re: -3, im }));
    expect(worstMiss(roots(multiply(pair, pair)), twice)).toBeLessThan(1e-14);
  });

  it('finds 24 roots over 12 decades of size', () => {
    const wanted = Array.from({ length: 24 }, (_, k) => -(10 ** (k / 2 - 6)));
    expect(worstMiss(roots(fromReals(wanted)), wanted.map(real))).toBeLessThan(1e-12);
  });

  it('keeps undamped pairs on the imaginary axis', () => {
    const found = roots([1, 1, 100, 100]).filter((z) => z.im !== 0);
    expect(found.map((z) => z.re)).toEqual([0, 0]);
    expect(Math.abs(found[0].im)).toBeCloseTo(10, 12);
    expect(roots([1, 0, 5, 0, 4]).every((z) => z.re === 0)).toBe(true);
  });

  it('refuses coefficients that are not finite', () => {
    expect(() => roots([1, NaN])).toThrow(RangeError);
  });

  it('returns the roots a random polynomial was built from', () => {
    // Grid values, at least 8 % apart, so that every root is well conditioned enough to compare.
    const size = fc.integer({ min: -40, max: 40 }).map((k) => 10 ** (k / 30));
    const realRoot = fc.tuple(size, fc.boolean()).map(([r, right]) => [real(right ? r : -r)]);
    const pair = fc.tuple(size, fc.integer({ min: 1, max: 19 }), fc.boolean()).map(([r, k, right]) => {
      const re = (right ? 1 : -1) * r * Math.cos((k * Math.PI) / 40);
      const im = r * Math.sin((k * Math.PI) / 40);
      return [
        { re, im },
        { re, im: -im },
      ];
    });
    const separate = (list: ComplexNumber[]) =>
      list.every((a, i) =>
        list.every((b, j) => i <= j || Math.hypot(a.re - b.re, a.im - b.im) > 0.05 * Math.hypot(a.re, a.im)),
      );
    const factors = fc.array(fc.oneof(realRoot, pair), { minLength: 1, maxLength: 5 });
    fc.assert(
      fc.property(
        factors.filter((list) => separate(list.flat())),
        (list) => {
          const p = list.reduce<number[]>(
            (product, [z, partner]) => {
              return multiply(product, partner ? [1, -2 * z.re, z.re ** 2 + z.im ** 2] : [1, -z.re]);
            },
            [1],
          );
          expect(worstMiss(roots(p), list.flat())).toBeLessThan(1e-6);
        },
      ),
    );
  });
});
