import { formatNumber } from '../../units';
import { ideal } from './native';
import { defineRule, integratorRow, needsDeadTime, row } from './row';

/** Below this share of dead time in θ + τ the PID settings are conservative. */
const LAG_DOMINATED_BELOW = 0.3;

/**
 * AMIGO. PI: kp = [0.15 + (0.35 − θτ/(θ + τ)²) τ/θ]/k, ti = 0.35 θ + 13 θ τ²/(τ² + 12 θτ + 7 θ²);
 * PID: kp = (0.2 + 0.45 τ/θ)/k, ti = θ (0.4 θ + 0.8 τ)/(θ + 0.1 τ), td = 0.5 θτ/(0.3 θ + τ), set-point weight
 * b = 0 for θ < τ, else 1. Integrating: PI 0.35/(kθ), 13.4 θ · PID 0.45/(kθ), 8 θ, 0.5 θ, b = 0.
 */
export const amigo = defineRule({
  id: 'amigo',
  name: 'AMIGO',
  types: ['PI', 'PID'],
  aim: 'Load: the least integrated error with sensitivity peaks up to 1.4.',
  form: 'ideal',
  validity:
    'First-order and integrating plants with any dead time greater than 0; PID is conservative where θ/(θ + τ) < 0.3.',
  source:
    'Åström & Hägglund, Revisiting the Ziegler–Nichols step response method for PID control, Journal of Process Control 14 (2004) 635–650',
  setting: null,
  variants: [],
  rows: [
    row('first-order', 'PI', {
      objection: needsDeadTime,
      settings: ({ k, tau, theta }) => pi(k, tau, theta),
    }),
    row('gain', 'PI', { objection: needsDeadTime, settings: ({ k, theta }) => pi(k, 0, theta) }),
    row('first-order', 'PID', {
      objection: needsDeadTime,
      settings: ({ k, tau, theta }) =>
        ideal(
          (0.2 + (0.45 * tau) / theta) / k,
          (theta * (0.4 * theta + 0.8 * tau)) / (theta + 0.1 * tau),
          (0.5 * theta * tau) / (0.3 * theta + tau),
          { b: theta < tau ? 0 : 1 },
        ),
      warnings: ({ tau, theta }) =>
        theta / (theta + tau) < LAG_DOMINATED_BELOW
          ? [
              `The PID settings are conservative here: θ/(θ + τ) is ${formatNumber(theta / (theta + tau), { significant: 3 })}, below 0.3.`,
            ]
          : [],
    }),
    integratorRow('PI', (k, theta) => ideal(0.35 / (k * theta), 13.4 * theta)),
    integratorRow('PID', (k, theta) => ideal(0.45 / (k * theta), 8 * theta, 0.5 * theta, { b: 0 })),
  ],
});

function pi(k: number, tau: number, theta: number) {
  return ideal(
    (0.15 + ((0.35 - (theta * tau) / (theta + tau) ** 2) * tau) / theta) / k,
    0.35 * theta + (13 * theta * tau ** 2) / (tau ** 2 + 12 * theta * tau + 7 * theta ** 2),
  );
}
