import { aberth } from './roots/aberth';
import { mergeClusters } from './roots/clusters';
import { pairConjugates } from './roots/conjugates';
import type { ComplexNumber } from './roots/complex';
import { trimmed, type Polynomial } from './polynomial';

export type { ComplexNumber } from './roots/complex';

/**
 * All complex roots of a real polynomial, with multiplicity.
 *
 * @param p coefficients in descending powers, finite; magnitudes from 1e-12 to 1e12 and degrees up to 24 are well served
 * @returns one entry per root: zeros at the origin first (exact), conjugate pairs exactly conjugate and side by side
 * Special cases: constants and the zero polynomial have no roots; a polynomial in s² gives exactly imaginary roots
 * where they are; roots that the coefficients cannot tell apart are returned as one multiple root.
 * @throws RangeError for a coefficient that is not finite
 * Method: simultaneous iteration of Aberth (1973) from the Newton polygon's radii (Bini 1996).
 */
export function roots(p: Polynomial): ComplexNumber[] {
  if (!p.every(Number.isFinite))
    throw new RangeError(`roots: every coefficient must be finite, got [${p.join(', ')}]`);
  const coefficients = trimmed(p);
  let atOrigin = 0;
  while (coefficients.length > 1 && coefficients[coefficients.length - 1] === 0) {
    coefficients.pop();
    atOrigin += 1;
  }
  const origin = Array.from({ length: atOrigin }, () => ({ re: 0, im: 0 }));
  return [...origin, ...rootsAwayFromOrigin(coefficients)];
}

function rootsAwayFromOrigin(p: number[]): ComplexNumber[] {
  const degree = p.length - 1;
  if (degree === 0) return [];
  if (degree === 1) return [{ re: -p[1] / p[0], im: 0 }];
  if (degree === 2) return quadraticRoots(p[0], p[1], p[2]);
  if (p.every((c, i) => i % 2 === 0 || c === 0)) {
    return rootsAwayFromOrigin(p.filter((_, i) => i % 2 === 0)).flatMap(bothSquareRoots);
  }
  return mergeClusters(p, pairConjugates(p, aberth(p)));
}

/** Without cancellation: the larger root first, the other from the product of both. */
export function quadraticRoots(a: number, b: number, c: number): ComplexNumber[] {
  const half = -b / (2 * a) || 0; // never -0
  const product = c / a;
  const discriminant = half * half - product;
  if (discriminant < 0) {
    const im = Math.sqrt(-discriminant);
    return [
      { re: half, im },
      { re: half, im: -im },
    ];
  }
  const larger = half + (half < 0 ? -1 : 1) * Math.sqrt(discriminant);
  return [
    { re: larger, im: 0 },
    { re: larger === 0 ? 0 : product / larger, im: 0 },
  ];
}

/** The two roots s of s² = x; a conjugate partner of x brings the two missing ones. */
function bothSquareRoots(x: ComplexNumber): ComplexNumber[] {
  if (x.im === 0) {
    const size = Math.sqrt(Math.abs(x.re));
    return x.re < 0
      ? [
          { re: 0, im: size },
          { re: 0, im: -size },
        ]
      : [
          { re: -size, im: 0 },
          { re: size, im: 0 },
        ];
  }
  // One pair per member of the conjugate pair, so that conjugates stand side by side.
  const size = Math.hypot(x.re, x.im);
  const re = Math.sqrt((size + x.re) / 2) * Math.sign(x.im);
  const im = Math.sqrt((size - x.re) / 2);
  return [
    { re, im },
    { re, im: -im },
  ];
}
