import type { ComplexNumber } from './complex';
import { rootError } from './error-bound';

/**
 * Makes computed roots of a real polynomial exactly symmetric: partners are averaged, a root nearer to its own mirror
 * image than to any other root is real. A pair whose distance to the imaginary axis is below the rounding error of
 * its coefficients lies on the axis.
 */
export function pairConjugates(p: readonly number[], found: readonly ComplexNumber[]): ComplexNumber[] {
  const open = [...found].sort((a, b) => Math.abs(b.im) - Math.abs(a.im));
  const paired: ComplexNumber[] = [];
  while (open.length > 0) {
    const root = open.shift() as ComplexNumber;
    let partner = -1;
    let nearest = 4 * root.im * root.im;
    for (let i = 0; i < open.length; i += 1) {
      const distance = (open[i].re - root.re) ** 2 + (open[i].im + root.im) ** 2;
      if (distance >= nearest) continue;
      nearest = distance;
      partner = i;
    }
    if (partner < 0) {
      paired.push({ re: root.re, im: 0 });
      continue;
    }
    const [other] = open.splice(partner, 1);
    const im = (Math.abs(root.im) + Math.abs(other.im)) / 2;
    let re = (root.re + other.re) / 2;
    if (Math.abs(re) <= 1e-8 * im && Math.abs(re) <= rootError(p, re, im)) re = 0;
    paired.push({ re, im }, { re, im: -im });
  }
  return paired;
}
