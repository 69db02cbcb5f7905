import { trimmed } from '../../control/polynomial';
import type { Plant } from '../../control/types';

/**
 * The plant without its dead time, times `gain`, as first-order equations in the dimensionless time x = t/timeUnitS:
 *
 *   zᵢ' = rate·(−a[i]·z₁ + zᵢ₊₁ + b[i]·input),   output = z₁ + direct·input.
 *
 * Each state is scaled by a power of the plant's own frequency, so that all of them are of the size of the output and
 * one error tolerance suits them all.
 */
export interface PlantStates {
  readonly order: number;
  readonly rate: number;
  readonly a: readonly number[];
  readonly b: readonly number[];
  readonly direct: number;
  /** Order of the lowest derivative of the output that jumps when the input does; 0 for a biproper plant. */
  readonly relativeDegree: number;
}

export function plantStates(plant: Plant, gain: number, timeUnitS: number): PlantStates {
  const den = trimmed(plant.den);
  const num = trimmed(plant.num);
  const order = den.length - 1;
  const relativeDegree = order - (num.length - 1);
  if (relativeDegree < 0 || den[0] === 0) {
    throw new RangeError(
      'plant: the degree of num must not exceed the degree of den, and den must not be zero',
    );
  }
  const a = den.slice(1).map((c) => c / den[0]);
  const padded = [...new Array<number>(relativeDegree).fill(0), ...num].map((c) => (gain * c) / den[0]);
  const direct = padded[0];
  const b = padded.slice(1).map((c, i) => c - direct * a[i]);
  const frequency = ownFrequency(a, b) || 1 / timeUnitS;
  return {
    order,
    rate: frequency * timeUnitS,
    a: a.map((c, i) => c / frequency ** (i + 1)),
    b: b.map((c, i) => c / frequency ** (i + 1)),
    direct,
    relativeDegree,
  };
}

/** Geometric mean of the poles away from the origin; for pure integrators the frequency where the gain is 1. */
function ownFrequency(a: readonly number[], b: readonly number[]): number {
  let last = a.length - 1;
  while (last >= 0 && a[last] === 0) last -= 1;
  if (last >= 0) return Math.abs(a[last]) ** (1 / (last + 1));
  return a.length === 0 ? 0 : Math.abs(b[b.length - 1]) ** (1 / a.length);
}
