import { derivative, evaluateComplex } from '../polynomial';
import type { ComplexNumber } from './complex';

const RADII = [0.2, 0.1, 0.05, 0.02, 1e-2, 1e-3, 1e-4, 1e-5, 1e-6, 1e-7];

interface Merge {
  readonly roots: ComplexNumber[];
  readonly indices: readonly number[];
}

/**
 * An m-fold root is only found as a ring of m roots, about ε^(1/m) wide; as a simple root of the (m-1)th derivative it
 * is exact to rounding. A ring becomes one multiple root when the polynomial rebuilt with it has the same coefficients
 * to rounding.
 */
export function mergeClusters(p: readonly number[], found: readonly ComplexNumber[]): ComplexNumber[] {
  let best = [...found];
  const merged = new Set<number>();
  for (const radius of RADII) {
    const links = linked(best, radius);
    if (links === null) break;
    for (const group of groups(links)) {
      if (group.length < 2 || group.some((i) => merged.has(i))) continue;
      const trial = asMultipleRoot(p, best, group);
      if (trial === null || coefficientError(p, trial.roots) > 8 * p.length * Number.EPSILON) continue;
      best = trial.roots;
      trial.indices.forEach((i) => merged.add(i));
    }
  }
  return best;
}

/** Per root the label of its group: roots nearer than radius·|root| are together. null when all stand alone. */
function linked(list: readonly ComplexNumber[], radius: number): number[] | null {
  const label = list.map((_, i) => i);
  let any = false;
  for (let i = 0; i < list.length; i += 1) {
    const reach = radius * radius * (list[i].re ** 2 + list[i].im ** 2);
    for (let j = 0; j < i; j += 1) {
      if ((list[i].re - list[j].re) ** 2 + (list[i].im - list[j].im) ** 2 > reach) continue;
      any = true;
      const [from, to] = [label[i], label[j]];
      for (let k = 0; k < label.length; k += 1) if (label[k] === from) label[k] = to;
    }
  }
  return any ? label : null;
}

function groups(label: readonly number[]): number[][] {
  const byLabel = new Map<number, number[]>();
  label.forEach((name, i) => byLabel.set(name, [...(byLabel.get(name) ?? []), i]));
  return [...byLabel.values()];
}

/** The list with the group, and its mirror image, as multiple roots; null when that breaks the symmetry. */
function asMultipleRoot(
  p: readonly number[],
  list: readonly ComplexNumber[],
  group: readonly number[],
): Merge | null {
  const mirror = group.map((i) => list.findIndex((z) => z.re === list[i].re && z.im === -list[i].im));
  if (mirror.some((i) => i < 0)) return null;
  const selfMirrored = mirror.every((i) => group.includes(i));
  if (!selfMirrored && mirror.some((i) => group.includes(i))) return null;
  const mean = {
    re: group.reduce((sum, i) => sum + list[i].re, 0) / group.length,
    im: selfMirrored ? 0 : group.reduce((sum, i) => sum + list[i].im, 0) / group.length,
  };
  const root = polished(p, mean, group.length);
  const roots = [...list];
  for (const i of group) roots[i] = root;
  if (!selfMirrored) for (const i of mirror) roots[i] = { re: root.re, im: -root.im };
  return { roots, indices: [...group, ...mirror] };
}

/** Newton's method on the (m-1)th derivative, of which an m-fold root is a simple root. */
function polished(p: readonly number[], start: ComplexNumber, multiplicity: number): ComplexNumber {
  let simple: readonly number[] = p;
  for (let k = 1; k < multiplicity; k += 1) simple = derivative(simple);
  const slope = derivative(simple);
  let { re, im } = start;
  for (let step = 0; step < 4; step += 1) {
    const [vRe, vIm] = evaluateComplex(simple, re, im);
    const [dRe, dIm] = evaluateComplex(slope, re, im);
    const d2 = dRe * dRe + dIm * dIm;
    if (d2 === 0) return start;
    re -= (vRe * dRe + vIm * dIm) / d2;
    im -= (vIm * dRe - vRe * dIm) / d2;
  }
  return Number.isFinite(re) && Number.isFinite(im) ? { re, im } : start;
}

/** Largest deviation of the rebuilt coefficients, relative to those of the polynomial with roots -|r|. */
function coefficientError(p: readonly number[], list: readonly ComplexNumber[]): number {
  const re = new Float64Array(p.length);
  const im = new Float64Array(p.length);
  const size = new Float64Array(p.length);
  re[0] = p[0];
  size[0] = Math.abs(p[0]);
  list.forEach((root, done) => {
    const radius = Math.sqrt(root.re ** 2 + root.im ** 2);
    for (let i = done + 1; i > 0; i -= 1) {
      re[i] -= root.re * re[i - 1] - root.im * im[i - 1];
      im[i] -= root.re * im[i - 1] + root.im * re[i - 1];
      size[i] += radius * size[i - 1];
    }
  });
  return p.reduce((worst, c, i) => Math.max(worst, (Math.abs(c - re[i]) + Math.abs(im[i])) / size[i]), 0);
}
