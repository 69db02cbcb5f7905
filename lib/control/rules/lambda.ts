import { ideal } from './native';
import { defineRule, row } from './row';
import { closedLoopTime } from './setting-range';
import type { SettingRange } from './types';

/**
 * Lambda tuning: kp = τ/(k(λ + θ)), ti = τ; integrating kp = (2λ + θ)/(k(λ + θ)²), ti = 2λ + θ.
 * λ = 3θ leaves a gain margin of 6.3 for every θ/τ, λ = θ one of 3.1. Some sources neglect θ in the gain.
 */
export const lambda = defineRule({
  id: 'lambda',
  name: 'Lambda tuning',
  types: ['PI'],
  aim: 'Set-point: a first-order response of time constant λ after the dead time.',
  form: 'ideal',
  validity: 'First-order and integrating plants with any dead time; λ not below θ.',
  source:
    'Dahlin, Designing and tuning digital controllers, Instruments and Control Systems 41(6) (1968) 77–83',
  setting: { name: 'lambda', symbol: 'λ', unit: 's', recommended: 'The larger of 3 θ and τ/3.' },
  variants: [],
  rows: [
    row('first-order', 'PI', {
      range: ({ tau, theta }) => lambdaRange(Math.max(3 * theta, tau / 3), theta),
      settings: ({ k, tau, theta }, lambdaS) => ideal(tau / (k * (lambdaS + theta)), tau),
    }),
    row('integrator', 'PI', {
      range: ({ theta }) => (theta > 0 ? lambdaRange(3 * theta, theta) : null),
      settings: ({ k, theta }, lambdaS) =>
        ideal((2 * lambdaS + theta) / (k * (lambdaS + theta) ** 2), 2 * lambdaS + theta),
    }),
  ],
});

function lambdaRange(recommendedS: number, theta: number): SettingRange {
  if (theta === 0) return closedLoopTime(recommendedS);
  return closedLoopTime(recommendedS, theta, { least: { value: theta, words: 'λ ≥ θ' } });
}
