import { ideal } from './native';
import { defineRule, needsDeadTime, needsNoDeadTime, row } from './row';
import { closedLoopTime } from './setting-range';
import type { SettingRange } from './types';

/** Least λ over dead time that the source allows, by row. */
const PI_LIMIT = 1.7;
const PID_LIMIT = 0.8;
const PID_WITH_FILTER_LIMIT = 0.25;
/** Integrator with dead time, PID: below 2 θ the loop has next to no margin (Ms 5.3 at λ = θ). */
const INTEGRATOR_PID_LIMIT = 2;

/**
 * Internal model control with PID structure: the controller that makes the set-point response first-order with
 * time constant λ, the dead time replaced by a Taylor or Padé approximation.
 *
 * The source states its limits on λ for first-order plants with dead time. The other rows take over the limit that
 * belongs to the same approximation: Taylor rows of stable plants 0.8 θ (gain margin 2.8), of integrating plants
 * and of dead time alone 1.7 θ.
 */
export const imc = defineRule({
  id: 'imc',
  name: 'IMC-PID',
  types: ['P', 'PI', 'PD', 'PID'],
  aim: 'Set-point: a first-order response of time constant λ.',
  form: 'ideal',
  validity:
    'λ above 0.2 τ and above 1.7 θ (PI), 0.8 θ (PID) or 0.25 θ (PID with filter); slow recovery from load where τ is much longer than λ.',
  source:
    'Rivera, Morari & Skogestad, Internal model control. 4. PID controller design, Industrial & Engineering Chemistry Process Design and Development 25 (1986) 252–265',
  setting: {
    name: 'lambda',
    symbol: 'λ',
    unit: 's',
    recommended: '1.5 times the least λ that the source allows.',
  },
  variants: [
    { id: 'filter', name: 'PID with filter (first-order plant with dead time)' },
    { id: 'delay-neglected', name: 'PI with the dead time neglected (first-order plant)' },
  ],
  rows: [
    // k e^(−θs)/(τs + 1): PI with τ → τ + θ/2 ("improved"), PID by 1/1 Padé, PID with filter by Padé as all-pass.
    row('first-order', 'PI', {
      range: ({ tau, theta }) => range(tau, theta, PI_LIMIT),
      settings: ({ k, tau, theta }, lambda) => ideal((tau + theta / 2) / (k * lambda), tau + theta / 2),
    }),
    row('first-order', 'PI', {
      variant: 'delay-neglected',
      range: ({ tau, theta }) => range(tau, theta, PI_LIMIT),
      settings: ({ k, tau }, lambda) => ideal(tau / (k * lambda), tau),
    }),
    row('first-order', 'PID', {
      objection: needsDeadTimeForDerivative,
      range: ({ tau, theta }) => range(tau, theta, PID_LIMIT),
      settings: ({ k, tau, theta }, lambda) =>
        ideal(
          (tau + theta / 2) / (k * (lambda + theta / 2)),
          tau + theta / 2,
          (tau * theta) / (2 * tau + theta),
        ),
    }),
    row('first-order', 'PID', {
      variant: 'filter',
      objection: needsDeadTimeForDerivative,
      range: ({ tau, theta }) => range(tau, theta, PID_WITH_FILTER_LIMIT),
      settings: ({ k, tau, theta }, lambda) =>
        ideal(
          (tau + theta / 2) / (k * (lambda + theta)),
          tau + theta / 2,
          (tau * theta) / (2 * tau + theta),
          { filterTimeS: (lambda * theta) / (2 * (lambda + theta)) },
        ),
      warnings: () => [
        'The filter of the rule stands on the measurement here: the same loop, but it does not act on the set-point.',
      ],
    }),
    // Two lags or a damped pair with dead time: the controller's zeros cancel both poles.
    row('second-order-real', 'PID', {
      range: ({ tau1, theta }) => range(tau1, theta, PID_LIMIT),
      settings: ({ k, tau1, tau2, theta }, lambda) =>
        ideal((tau1 + tau2) / (k * (lambda + theta)), tau1 + tau2, (tau1 * tau2) / (tau1 + tau2)),
    }),
    row('second-order-complex', 'PID', {
      range: ({ tau, theta }) => range(tau, theta, PID_LIMIT),
      settings: ({ k, tau, zeta, theta }, lambda) =>
        ideal((2 * zeta * tau) / (k * (lambda + theta)), 2 * zeta * tau, tau / (2 * zeta)),
    }),
    row('second-order-rhp-zero', 'PID', {
      objection: needsNoDeadTime,
      range: ({ tau, beta }) => range(tau, beta, PID_LIMIT),
      settings: ({ k, tau, zeta, beta }, lambda) =>
        ideal((2 * zeta * tau) / (k * (beta + lambda)), 2 * zeta * tau, tau / (2 * zeta)),
    }),
    // Integrating plants: P and PD for set-point steps, PI and PID for ramps and load steps.
    row('integrator', 'P', {
      objection: needsNoDeadTime,
      settings: ({ k }, lambda) => ideal(1 / (k * lambda)),
    }),
    row('integrator', 'PI', {
      range: ({ theta }) => range(0, theta, PI_LIMIT),
      settings: ({ k, theta }, lambda) =>
        ideal((2 * lambda + theta) / (k * (lambda + theta) ** 2), 2 * lambda + theta),
    }),
    row('integrator', 'PID', {
      objection: needsDeadTimeForDerivative,
      range: ({ theta }) => range(0, theta, INTEGRATOR_PID_LIMIT),
      settings: ({ k, theta }, lambda) =>
        ideal(
          2 / (k * (lambda + theta / 2)),
          2 * lambda + theta,
          (lambda * theta + theta ** 2 / 4) / (2 * lambda + theta),
        ),
    }),
    row('integrator-lag', 'PD', {
      objection: needsNoDeadTime,
      range: ({ tau, theta }) => range(tau, theta, PID_LIMIT),
      settings: ({ k, tau }, lambda) => ideal(1 / (k * lambda), Infinity, tau),
    }),
    row('integrator-lag', 'PID', {
      range: ({ tau, theta }) => range(tau, theta, PI_LIMIT),
      settings: ({ k, tau, theta }, lambda) =>
        ideal(
          (2 * lambda + tau + theta) / (k * (lambda + theta) ** 2),
          2 * lambda + tau + theta,
          ((2 * lambda + theta) * tau) / (2 * lambda + tau + theta),
        ),
    }),
    // Dead time alone, by Padé.
    row('gain', 'PI', {
      objection: needsDeadTime,
      range: ({ theta }) => range(0, theta, PI_LIMIT),
      settings: ({ k, theta }, lambda) => ideal(theta / (k * (2 * lambda + theta)), theta / 2),
    }),
  ],
});

function range(tau: number, theta: number, perDeadTime: number): SettingRange | null {
  const leastS = Math.max(0.2 * tau, perDeadTime * theta);
  if (leastS === 0) return null;
  const limits = [...(tau > 0 ? ['λ > 0.2 τ'] : []), ...(theta > 0 ? [`λ > ${perDeadTime} θ`] : [])];
  return closedLoopTime(1.5 * leastS, leastS, { least: { value: leastS, words: limits.join(' and ') } });
}

function needsDeadTimeForDerivative({ theta }: { readonly theta: number }): string | null {
  return theta > 0
    ? null
    : 'Without dead time the derivative time of this row is 0: the rule gives a PI controller here, so ask for PI.';
}
