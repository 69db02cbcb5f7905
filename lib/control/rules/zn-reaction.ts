import { ideal } from './native';
import { defineRule, integratorRow, stepTestRow } from './row';

/**
 * Ziegler–Nichols, reaction curve: P 1/(RL) · PI 0.9/(RL), L/0.3 · PID 1.2/(RL), 2L, 0.5L, with the unit
 * reaction rate R = k/τ (R = k for an integrator) and the lag L = θ.
 * Sources disagree on the integral time of PI: L/0.3 as in the paper; others print 3.3 L or 3 L.
 */
export const znReaction = defineRule({
  id: 'zn-reaction',
  name: 'Ziegler–Nichols, reaction curve',
  types: ['P', 'PI', 'PID'],
  aim: 'Load: each swing a quarter of the one before.',
  form: 'ideal',
  validity:
    'First-order or integrating plants with dead time, 0.1 < θ/τ < 1; little robustness below, sluggish above.',
  source:
    'Ziegler & Nichols, Optimum settings for automatic controllers, Transactions of the ASME 64 (1942) 759–768',
  deadTimeRatio: [0.1, 1],
  setting: null,
  variants: [],
  rows: [
    stepTestRow('P', (k, tau, theta) => p((k * theta) / tau)),
    stepTestRow('PI', (k, tau, theta) => pi((k * theta) / tau, theta)),
    stepTestRow('PID', (k, tau, theta) => pid((k * theta) / tau, theta)),
    integratorRow('P', (k, theta) => p(k * theta)),
    integratorRow('PI', (k, theta) => pi(k * theta, theta)),
    integratorRow('PID', (k, theta) => pid(k * theta, theta)),
  ],
});

function p(rateTimesLag: number) {
  return ideal(1 / rateTimesLag);
}

function pi(rateTimesLag: number, lagS: number) {
  return ideal(0.9 / rateTimesLag, lagS / 0.3);
}

function pid(rateTimesLag: number, lagS: number) {
  return ideal(1.2 / rateTimesLag, 2 * lagS, 0.5 * lagS);
}
