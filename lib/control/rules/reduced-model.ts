import { formatNumber } from '../../units';
import { reducePlant, type ReducedModel, type Reduction, type ReductionTarget } from '../reduction/reduce';
import type { PlantShape } from '../reduction/recognise';
import type { Plant } from '../types';
import type { ModelShape, Row, RuleModel } from './types';

/** Shapes that no reduction makes simpler. */
const SIMPLEST: readonly PlantShape['shape'][] = ['gain', 'first-order', 'integrator', 'double-integrator'];

/** A fitted model further from the plant than this, relative to its final value, is not taken for it (common practice). */
const LARGEST_FIT_ERROR = 0.3;

/** The wanted models in order of preference, with the shape of row that each serves. */
const SELF_REGULATING: readonly (readonly [ReductionTarget, ModelShape])[] = [
  ['sopdt', 'second-order-real'],
  ['fopdt', 'first-order'],
];
const INTEGRATING: readonly (readonly [ReductionTarget, ModelShape])[] = [
  ['integrating-lag', 'integrator-lag'],
  ['integrating', 'integrator'],
];

export type Attempt =
  { readonly model: RuleModel; readonly reduction: Reduction } | { readonly refusal: string };

/**
 * The reduced models of a plant that one of the rows is written for, best first; a refusal where the plant cannot be
 * reduced to it. Empty when there is nothing to reduce.
 *
 * @param tauCS closed-loop time for the numerator rules of the half rule in s, where the rule has one
 */
export function reducedModels(
  plant: Plant,
  shape: PlantShape['shape'],
  rows: readonly Row[],
  tauCS?: number,
): readonly Attempt[] {
  if (SIMPLEST.includes(shape)) return [];
  const wanted = integrates(plant) ? INTEGRATING : SELF_REGULATING;
  return wanted
    .filter(([, served]) => rows.some((row) => row.shape === served))
    .map(([target]) => {
      const reduction = reducePlant(plant, target, tauCS === undefined ? {} : { tauCS });
      if (!reduction.ok) return { refusal: reduction.message };
      const { method, error = 0 } = reduction.value;
      if (method === 'step fit' && error > LARGEST_FIT_ERROR) return { refusal: tooFar(error) };
      return { model: modelOf(reduction.value.model, target), reduction: reduction.value };
    });
}

function modelOf({ k, tau = 0, tau2 = 0, thetaS: theta }: ReducedModel, target: ReductionTarget): RuleModel {
  if (target === 'integrating' || (target === 'integrating-lag' && tau2 === 0)) {
    return { shape: 'integrator', k, theta };
  }
  if (target === 'integrating-lag') return { shape: 'integrator-lag', k, tau: tau2, theta };
  // The half rule can leave a second lag longer than the first; the source puts the longer one first.
  const tau1 = Math.max(tau, tau2);
  const shorter = Math.min(tau, tau2);
  if (shorter > 0) return { shape: 'second-order-real', k, tau1, tau2: shorter, theta };
  return tau1 > 0 ? { shape: 'first-order', k, tau: tau1, theta } : { shape: 'gain', k, theta };
}

function tooFar(error: number): string {
  const percent = formatNumber(100 * error, { significant: 2 });
  return `The plant oscillates too much for the simple model of the rule: their step responses differ by ${percent} % of the final value.`;
}

function integrates({ num, den }: Plant): boolean {
  return trailingZeros(den) > trailingZeros(num);
}

function trailingZeros(p: readonly number[]): number {
  let count = 0;
  while (count < p.length && p[p.length - 1 - count] === 0) count += 1;
  return count;
}
