import { trimmed, type Polynomial } from '../polynomial';

/**
 * Are all roots in the open left half plane? Routh's array; a zero or a change of sign in its first column says no,
 * so that a root exactly on the imaginary axis counts as unstable.
 *
 * For stable polynomials the array is elimination on a totally non-negative matrix, which loses no accuracy.
 * @param p coefficients in descending powers; a constant other than zero has no roots and passes
 */
export function isHurwitz(p: Polynomial): boolean {
  const coefficients = trimmed(p);
  if (coefficients[0] === 0) return false;
  const sign = Math.sign(coefficients[0]);
  const c = coefficients.map((value) => value * sign);
  if (c.some((value) => !(value > 0))) return false;
  let upper = c.filter((_, i) => i % 2 === 0);
  let lower = c.filter((_, i) => i % 2 === 1);
  while (lower.length > 0) {
    const ratio = upper[0] / lower[0];
    const next: number[] = [];
    for (let i = 1; i < upper.length; i += 1) next.push(upper[i] - ratio * (lower[i] ?? 0));
    if (next.length > 0 && !(next[0] > 0)) return false;
    upper = lower;
    lower = next;
  }
  return true;
}
