import { trimmed } from '../polynomial';
import type { Plant } from '../types';
import { realRootsOfCubic, realRootsOfQuadratic } from './real-roots';

/**
 * The shapes that tuning rules are written for. `k` carries the sign of the gain, `theta` is the dead time in
 * seconds (≥ 0), every other time constant is in seconds and positive, tau1 ≥ tau2 ≥ tau3.
 *
 * gain: k · first-order: k/(τs+1) · second-order-real: k/((τ1 s+1)(τ2 s+1)) ·
 * second-order-complex: k/(τ²s²+2ζτs+1), 0 < ζ < 1 · second-order-rhp-zero: k(1−βs)/(τ²s²+2ζτs+1), ζ > 0 ·
 * third-order-real: three real lags · integrator: k/s · integrator-lag: k/(s(τs+1)) ·
 * integrator-two-lags: k/(s(τ1 s+1)(τ2 s+1)) · integrator-zero-lag: k(tz·s+1)/(s(τ2 s+1)) ·
 * double-integrator: k/s²; each times e^(−θs). Everything else is general.
 */
export type PlantShape =
  | { readonly shape: 'gain'; readonly k: number; readonly theta: number }
  | { readonly shape: 'first-order'; readonly k: number; readonly tau: number; readonly theta: number }
  | {
      readonly shape: 'second-order-real';
      readonly k: number;
      readonly tau1: number;
      readonly tau2: number;
      readonly theta: number;
    }
  | {
      readonly shape: 'second-order-complex';
      readonly k: number;
      readonly tau: number;
      readonly zeta: number;
      readonly theta: number;
    }
  | {
      readonly shape: 'second-order-rhp-zero';
      readonly k: number;
      readonly tau: number;
      readonly zeta: number;
      readonly beta: number;
      readonly theta: number;
    }
  | {
      readonly shape: 'third-order-real';
      readonly k: number;
      readonly tau1: number;
      readonly tau2: number;
      readonly tau3: number;
      readonly theta: number;
    }
  | { readonly shape: 'integrator'; readonly k: number; readonly theta: number }
  | { readonly shape: 'integrator-lag'; readonly k: number; readonly tau: number; readonly theta: number }
  | {
      readonly shape: 'integrator-two-lags';
      readonly k: number;
      readonly tau1: number;
      readonly tau2: number;
      readonly theta: number;
    }
  | {
      readonly shape: 'integrator-zero-lag';
      readonly k: number;
      readonly tz: number;
      readonly tau2: number;
      readonly theta: number;
    }
  | { readonly shape: 'double-integrator'; readonly k: number; readonly theta: number }
  | { readonly shape: 'general' };

const GENERAL: PlantShape = { shape: 'general' };

/**
 * Names the shape of a plant and gives its parameters exact to rounding.
 *
 * @param plant num/den in descending powers; factors s common to both are cancelled first, other common factors
 *   are not (a hidden mode stays part of the plant).
 * @returns one of the shapes of `PlantShape`; `general` for unstable or undamped poles, other zeros, higher order.
 *   Poles equal to within 1e-9 of themselves count as repeated.
 */
export function recognisePlant(plant: Plant): PlantShape {
  const { num, den } = withoutCommonIntegrators(trimmed(plant.num), trimmed(plant.den));
  const theta = plant.deadTimeS;
  if (num.every((c) => c === 0) || den.every((c) => c === 0) || num.length > den.length) return GENERAL;
  const integrators = trailingZeros(den);
  // Time-constant form: k · (…+ z1 s + 1)/(s^integrators (…+ a1 s + 1)).
  const poles = den.slice(0, den.length - integrators);
  const k = num[num.length - 1] / poles[poles.length - 1];
  const lagPolynomial = poles.map((c) => c / poles[poles.length - 1]);
  const zeroPolynomial = num.map((c) => c / num[num.length - 1]);
  if (!Number.isFinite(k) || k === 0) return GENERAL;
  if (zeroPolynomial.length === 1) return withoutZero(k, lagPolynomial, integrators, theta);
  if (zeroPolynomial.length === 2)
    return withOneZero(k, zeroPolynomial[0], lagPolynomial, integrators, theta);
  return GENERAL;
}

function withoutZero(k: number, lagPolynomial: number[], integrators: number, theta: number): PlantShape {
  const order = lagPolynomial.length - 1;
  if (integrators === 2 && order === 0) return { shape: 'double-integrator', k, theta };
  if (integrators > 1 || order > 3) return GENERAL;
  const lags = realLags(lagPolynomial);
  if (lags === null) return integrators === 0 ? complexPair(k, lagPolynomial, theta) : GENERAL;
  const [tau1, tau2, tau3] = lags;
  if (integrators === 1) {
    if (order === 0) return { shape: 'integrator', k, theta };
    if (order === 1) return { shape: 'integrator-lag', k, tau: tau1, theta };
    return order === 2 ? { shape: 'integrator-two-lags', k, tau1, tau2, theta } : GENERAL;
  }
  if (order === 0) return { shape: 'gain', k, theta };
  if (order === 1) return { shape: 'first-order', k, tau: tau1, theta };
  if (order === 2) return { shape: 'second-order-real', k, tau1, tau2, theta };
  return { shape: 'third-order-real', k, tau1, tau2, tau3, theta };
}

function withOneZero(
  k: number,
  zeroTime: number,
  lagPolynomial: number[],
  integrators: number,
  theta: number,
): PlantShape {
  const order = lagPolynomial.length - 1;
  if (integrators === 1 && order === 1 && zeroTime > 0 && lagPolynomial[0] > 0) {
    return { shape: 'integrator-zero-lag', k, tz: zeroTime, tau2: lagPolynomial[0], theta };
  }
  if (integrators === 0 && order === 2 && zeroTime < 0 && lagPolynomial[0] > 0 && lagPolynomial[1] > 0) {
    const tau = Math.sqrt(lagPolynomial[0]);
    return {
      shape: 'second-order-rhp-zero',
      k,
      tau,
      zeta: lagPolynomial[1] / (2 * tau),
      beta: -zeroTime,
      theta,
    };
  }
  return GENERAL;
}

function complexPair(k: number, lagPolynomial: number[], theta: number): PlantShape {
  const [a2, a1] = lagPolynomial;
  if (lagPolynomial.length !== 3 || !(a2 > 0) || !(a1 > 0)) return GENERAL;
  const tau = Math.sqrt(a2);
  return { shape: 'second-order-complex', k, tau, zeta: a1 / (2 * tau), theta };
}

/**
 * Time constants of a polynomial … + a1 s + 1 of order up to 3 with real negative roots only, largest first;
 * null otherwise. τ = −1/root solves the polynomial in reversed order with alternating signs.
 */
function realLags(lagPolynomial: number[]): number[] | null {
  const order = lagPolynomial.length - 1;
  if (order === 0) return [];
  if (lagPolynomial.some((c) => !(c > 0))) return null;
  const rising = lagPolynomial.slice().reverse();
  const inTau = rising.map((c, power) => (power % 2 === 0 ? c : -c));
  if (order === 1) return [lagPolynomial[0]];
  const roots = order === 2 ? realRootsOfQuadratic(inTau) : realRootsOfCubic(inTau);
  return roots === null || roots.some((tau) => !(tau > 0)) ? null : roots.sort((a, b) => b - a);
}

function trailingZeros(p: readonly number[]): number {
  let count = 0;
  while (count < p.length && p[p.length - 1 - count] === 0) count += 1;
  return count;
}

function withoutCommonIntegrators(num: number[], den: number[]): { num: number[]; den: number[] } {
  const common = Math.min(trailingZeros(num), trailingZeros(den), num.length - 1, den.length - 1);
  return { num: num.slice(0, num.length - common), den: den.slice(0, den.length - common) };
}
