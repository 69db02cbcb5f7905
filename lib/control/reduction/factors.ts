import { trimmed } from '../polynomial';
import { roots, type ComplexNumber } from '../roots';
import type { Plant } from '../types';

/** A pair damped at least this much is as good as two equal lags (a repeated lag split by rounding looks like that). */
const PRACTICALLY_REAL = 0.99;

/** A plant taken apart into k · Π(±Ts+1) / (s^integrators Π(τs+1)) · e^(−θs). */
export interface PlantFactors {
  readonly k: number;
  readonly integrators: number;
  /** Real stable lags τ, largest first. */
  readonly lags: readonly number[];
  /** Numerator factors (Ts+1), largest first. */
  readonly leads: readonly number[];
  /** Numerator factors (−Ts+1): inverse response. */
  readonly inverse: readonly number[];
  readonly complexPoles: boolean;
  readonly complexZeros: boolean;
  readonly unstable: boolean;
  /** Zeros at the origin that no integrator cancels. */
  readonly zeroStaticGain: boolean;
}

export function plantFactors(plant: Plant): PlantFactors {
  const num = trimmed(plant.num);
  const den = trimmed(plant.den);
  const zeros = roots(num);
  const poles = roots(den);
  const atOrigin = (list: typeof zeros) => list.filter((r) => r.re === 0 && r.im === 0).length;
  const common = Math.min(atOrigin(zeros), atOrigin(poles));
  const lastAwayFromOrigin = (p: readonly number[], count: number) => p[p.length - 1 - count];
  const isReal = (r: ComplexNumber) => Math.abs(r.re) >= PRACTICALLY_REAL * Math.hypot(r.re, r.im);
  const times = (list: typeof zeros) =>
    list
      .filter((r) => isReal(r) && r.re !== 0)
      // For a pair this is half the sum of both −1/root, which is all that the half rule adds up.
      .map((r) => -r.re / (r.re ** 2 + r.im ** 2))
      .sort((a, b) => b - a);
  const zeroTimes = times(zeros);
  return {
    k: lastAwayFromOrigin(num, atOrigin(zeros)) / lastAwayFromOrigin(den, atOrigin(poles)),
    integrators: atOrigin(poles) - common,
    lags: times(poles).filter((tau) => tau > 0),
    leads: zeroTimes.filter((t) => t > 0),
    inverse: zeroTimes.filter((t) => t < 0).map((t) => -t),
    complexPoles: poles.some((r) => !isReal(r)),
    complexZeros: zeros.some((r) => !isReal(r)),
    unstable: poles.some((r) => r.re > 0 || (r.re === 0 && r.im !== 0)),
    zeroStaticGain: atOrigin(zeros) > common,
  };
}
