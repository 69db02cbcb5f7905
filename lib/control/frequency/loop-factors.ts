import { quadraticRoots, roots, type ComplexNumber } from '../roots';
import type { IdealController, Plant } from '../types';

/** Zeros and poles of a loop or plant, each as often as it occurs, those at the origin included. */
export interface Factors {
  readonly zeros: readonly ComplexNumber[];
  readonly poles: readonly ComplexNumber[];
}

/** Plants are never changed, and searches check thousands of controllers against the same one. */
const known = new WeakMap<Plant, Factors>();

export function plantFactors(plant: Plant): Factors {
  const remembered = known.get(plant);
  if (remembered !== undefined) return remembered;
  const factors = { zeros: roots(plant.num), poles: roots(plant.den) };
  known.set(plant, factors);
  return factors;
}

/** Zeros and poles of L = Cy·G·F; nothing is cancelled. The controller's are known in closed form. */
export function loopFactors(plant: Plant, controller: IdealController): Factors {
  const { zeros, poles } = plantFactors(plant);
  return {
    zeros: [...zeros, ...controllerZeros(controller)],
    poles: [...poles, ...controllerPoles(controller), ...filterPoles(controller)],
  };
}

function controllerZeros({ kp, ti, td, n }: IdealController): ComplexNumber[] {
  if (kp === 0) return [];
  const lag = td > 0 ? td / n : 0;
  const lead = lag + td;
  if (ti === Infinity) return lead > 0 ? [{ re: -1 / lead, im: 0 }] : [];
  return lead > 0 ? quadraticRoots(lead, 1 + lag / ti, 1 / ti) : [{ re: -1 / ti, im: 0 }];
}

function controllerPoles({ kp, ti, td, n }: IdealController): ComplexNumber[] {
  if (kp === 0) return [];
  const integrator = ti === Infinity ? [] : [{ re: 0, im: 0 }];
  return td > 0 && n < Infinity ? [...integrator, { re: -n / td, im: 0 }] : integrator;
}

function filterPoles({ filter }: IdealController): ComplexNumber[] {
  if (filter === undefined || filter.timeConstantS === 0) return [];
  const corner = 1 / filter.timeConstantS;
  if (filter.order === 1) return [{ re: -corner, im: 0 }];
  return [
    { re: -corner, im: corner },
    { re: -corner, im: -corner },
  ];
}
