import { derivative, evaluateComplex } from '../polynomial';

/** How far rounding of the coefficients (relative, one unit in the last place) can move a simple root of p. */
export function rootError(p: readonly number[], re: number, im: number): number {
  const size = Math.hypot(re, im);
  const bound = p.reduce((sum, c) => sum * size + Math.abs(c), 0);
  const slope = Math.hypot(...evaluateComplex(derivative(p), re, im));
  return slope === 0 ? 0 : (2 * Number.EPSILON * bound) / slope;
}
