import type { ComplexNumber } from './complex';

const EPSILON = Number.EPSILON;
const MAX_SWEEPS = 120;
/** Turns the start circles away from symmetry with the real axis, where the iteration could stall. */
const START_ANGLE = 0.7;

/**
 * Simultaneous iteration of Aberth and Ehrlich on a real polynomial whose first and last coefficients are not zero.
 * A root counts as found when the polynomial there is as small as rounding lets it be.
 */
export function aberth(p: readonly number[]): ComplexNumber[] {
  const degree = p.length - 1;
  const unit = Math.pow(Math.abs(p[degree] / p[0]), 1 / degree);
  const c = scaled(p, unit);
  const { re, im } = startingPoints(c);
  const found = new Uint8Array(degree);
  const newton = { re: 0, im: 0, small: false };
  let open = degree;
  for (let sweep = 0; sweep < MAX_SWEEPS && open > 0; sweep += 1) {
    for (let i = 0; i < degree; i += 1) {
      if (found[i]) continue;
      newtonStep(c, re[i], im[i], newton);
      if (newton.small) {
        found[i] = 1;
        open -= 1;
        continue;
      }
      let pullRe = 0;
      let pullIm = 0;
      for (let j = 0; j < degree; j += 1) {
        if (j === i) continue;
        const dRe = re[i] - re[j];
        const dIm = im[i] - im[j];
        const d2 = dRe * dRe + dIm * dIm;
        if (d2 === 0) continue;
        pullRe += dRe / d2;
        pullIm -= dIm / d2;
      }
      const downRe = 1 - (newton.re * pullRe - newton.im * pullIm);
      const downIm = -(newton.re * pullIm + newton.im * pullRe);
      const down2 = downRe * downRe + downIm * downIm;
      const stepRe = down2 === 0 ? newton.re : (newton.re * downRe + newton.im * downIm) / down2;
      const stepIm = down2 === 0 ? newton.im : (newton.im * downRe - newton.re * downIm) / down2;
      re[i] -= stepRe;
      im[i] -= stepIm;
      if (Math.abs(stepRe) + Math.abs(stepIm) <= EPSILON * (Math.abs(re[i]) + Math.abs(im[i]))) {
        found[i] = 1;
        open -= 1;
      }
    }
  }
  return Array.from(re, (value, i) => ({ re: value * unit, im: im[i] * unit }));
}

/** p(unit·z), divided by its largest coefficient. */
function scaled(p: readonly number[], unit: number): Float64Array {
  const degree = p.length - 1;
  const c = Float64Array.from(p, (value, i) => value * Math.pow(unit, degree - i));
  const largest = c.reduce((max, value) => Math.max(max, Math.abs(value)), 0);
  return c.map((value) => value / largest);
}

/**
 * Points on the circles whose radii the Newton polygon (upper hull of log|coefficient| over the power) gives:
 * they have the right size even when roots are many decades apart.
 */
function startingPoints(c: Float64Array): { re: Float64Array; im: Float64Array } {
  const degree = c.length - 1;
  const height = (power: number) => Math.log(Math.abs(c[degree - power]));
  const hull: number[] = [];
  for (let power = 0; power <= degree; power += 1) {
    if (c[degree - power] === 0) continue;
    while (hull.length > 1) {
      const last = hull[hull.length - 1];
      const before = hull[hull.length - 2];
      const turn =
        (height(last) - height(before)) * (power - before) -
        (height(power) - height(before)) * (last - before);
      if (turn > 0) break;
      hull.pop();
    }
    hull.push(power);
  }
  const re = new Float64Array(degree);
  const im = new Float64Array(degree);
  for (let k = 1; k < hull.length; k += 1) {
    const count = hull[k] - hull[k - 1];
    const radius = Math.exp((height(hull[k - 1]) - height(hull[k])) / count);
    for (let j = 0; j < count; j += 1) {
      const angle = (2 * Math.PI * j) / count + START_ANGLE + (2 * Math.PI * k) / degree;
      re[hull[k - 1] + j] = radius * Math.cos(angle);
      im[hull[k - 1] + j] = radius * Math.sin(angle);
    }
  }
  return { re, im };
}

/** p/p' at z; outside the unit circle through the reversed polynomial, so that powers never overflow. */
function newtonStep(
  c: Float64Array,
  re: number,
  im: number,
  step: { re: number; im: number; small: boolean },
): void {
  const degree = c.length - 1;
  const size2 = re * re + im * im;
  const outside = size2 > 1;
  const x = outside ? re / size2 : re;
  const y = outside ? -im / size2 : im;
  const size = outside ? 1 / Math.sqrt(size2) : Math.sqrt(size2);
  let vRe = 0;
  let vIm = 0;
  let dRe = 0;
  let dIm = 0;
  let bound = 0;
  for (let k = 0; k <= degree; k += 1) {
    const coefficient = outside ? c[degree - k] : c[k];
    const nextD = dRe * x - dIm * y + vRe;
    dIm = dRe * y + dIm * x + vIm;
    dRe = nextD;
    const nextV = vRe * x - vIm * y + coefficient;
    vIm = vRe * y + vIm * x;
    vRe = nextV;
    bound = bound * size + Math.abs(coefficient);
  }
  const v2 = vRe * vRe + vIm * vIm;
  step.small = Math.sqrt(v2) <= 2 * EPSILON * bound;
  if (step.small) return;
  // Logarithmic derivative of the polynomial evaluated, then of p itself.
  let logRe = (dRe * vRe + dIm * vIm) / v2;
  let logIm = (dIm * vRe - dRe * vIm) / v2;
  if (outside) {
    const innerRe = degree - (x * logRe - y * logIm);
    const innerIm = -(x * logIm + y * logRe);
    logRe = x * innerRe - y * innerIm;
    logIm = x * innerIm + y * innerRe;
  }
  const log2 = logRe * logRe + logIm * logIm;
  step.re = log2 === 0 ? size : logRe / log2;
  step.im = log2 === 0 ? 0 : -logIm / log2;
}
