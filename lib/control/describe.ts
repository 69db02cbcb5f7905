import { checkPlant } from './loop';
import { trimmed } from './polynomial';
import { roots, type ComplexNumber } from './roots';
import type { Plant } from './types';

/** What a plant is, in the terms of the trade. */
export interface PlantDescription {
  readonly poles: readonly ComplexNumber[];
  readonly zeros: readonly ComplexNumber[];
  /** lim G(s) for s -> 0, signed; ±Infinity with an integrator that no zero at the origin cancels. */
  readonly dcGain: number;
  readonly order: number;
  /** Poles at the origin. */
  readonly integrators: number;
  readonly relativeDegree: number;
  /** Every pole in the left half plane. */
  readonly stable: boolean;
  readonly deadTimeS: number;
  /** One entry per complex pair of poles. */
  readonly oscillatoryModes: readonly OscillatoryMode[];
}

export interface OscillatoryMode {
  readonly naturalFrequency: number;
  /** -re/|pole|: negative for a growing mode. */
  readonly dampingRatio: number;
}

/**
 * Poles, zeros, gain, order and kind of a plant.
 *
 * @throws RangeError for a plant outside its range (improper, zero den, negative dead time)
 */
export function describePlant(plant: Plant): PlantDescription {
  checkPlant(plant);
  const num = trimmed(plant.num);
  const den = trimmed(plant.den);
  const poles = roots(den);
  const zeros = roots(num);
  return {
    poles,
    zeros,
    dcGain: dcGain(num, den),
    order: den.length - 1,
    integrators: poles.filter((pole) => pole.re === 0 && pole.im === 0).length,
    relativeDegree: den.length - num.length,
    stable: poles.every((pole) => pole.re < 0),
    deadTimeS: plant.deadTimeS,
    oscillatoryModes: poles.filter((pole) => pole.im > 0).map(oscillatoryMode),
  };
}

/** lim P/Q for s -> 0, from the lowest powers that are not zero. */
function dcGain(num: readonly number[], den: readonly number[]): number {
  const lowest = (p: readonly number[]) => p.length - 1 - p.findLastIndex((c) => c !== 0);
  if (num.every((c) => c === 0)) return 0;
  const [zeroOrder, poleOrder] = [lowest(num), lowest(den)];
  const ratio = num[num.length - 1 - zeroOrder] / den[den.length - 1 - poleOrder];
  if (zeroOrder > poleOrder) return 0;
  return poleOrder > zeroOrder ? Math.sign(ratio) * Infinity : ratio;
}

function oscillatoryMode(pole: ComplexNumber): OscillatoryMode {
  const naturalFrequency = Math.hypot(pole.re, pole.im);
  return { naturalFrequency, dampingRatio: pole.re === 0 ? 0 : -pole.re / naturalFrequency };
}
