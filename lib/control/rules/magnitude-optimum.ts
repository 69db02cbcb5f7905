import { ideal, integral, series } from './native';
import { defineRule, row } from './row';

/** Kessler's limit: with a main lag beyond this multiple of Tσ the load response is slow. */
const LAG_RATIO = 4;

/**
 * Magnitude optimum. Tσ is the sum of the small lags and the dead time: I ki = 1/(2 k Tσ) ·
 * PI kp = T1/(2 k Tσ), ti = T1 · PID in series form kc = T1/(2 k Tσ), τI = T1, τD = T2. The closed loop is
 * 1/(2Tσ²s² + 2Tσs + 1): 4.3 % overshoot.
 */
export const magnitudeOptimum = defineRule({
  id: 'magnitude-optimum',
  name: 'Magnitude optimum',
  types: ['I', 'PI', 'PID'],
  aim: 'Set-point: a flat closed-loop gain, 4.3 % overshoot; current loops of drives.',
  form: 'series',
  validity: 'Main lags T1, T2 compensated, the rest short; load recovery is slow where T1 > 4 Tσ.',
  source: 'Kessler, Regelungstechnik 3 (1955) 16–22 and 40–49 (pages from memory)',
  setting: null,
  variants: [],
  rows: [
    row('gain', 'I', {
      objection: ({ theta }) => smallLag(theta),
      settings: ({ k, theta }) => integral(1 / (2 * k * theta)),
    }),
    row('first-order', 'I', { settings: ({ k, tau, theta }) => integral(1 / (2 * k * (tau + theta))) }),
    row('first-order', 'PI', {
      objection: ({ theta }) => smallLag(theta),
      settings: ({ k, tau, theta }) => pi(k, tau, theta),
      warnings: ({ tau, theta }) => slowLoad(tau, theta),
    }),
    row('second-order-real', 'PI', {
      settings: ({ k, tau1, tau2, theta }) => pi(k, tau1, tau2 + theta),
      warnings: ({ tau1, tau2, theta }) => slowLoad(tau1, tau2 + theta),
    }),
    row('third-order-real', 'PI', {
      settings: ({ k, tau1, tau2, tau3, theta }) => pi(k, tau1, tau2 + tau3 + theta),
      warnings: ({ tau1, tau2, tau3, theta }) => slowLoad(tau1, tau2 + tau3 + theta),
    }),
    row('second-order-real', 'PID', {
      objection: ({ theta }) => smallLag(theta),
      settings: ({ k, tau1, tau2, theta }) => magnitudeOptimumPid(k, tau1, tau2, theta),
      warnings: ({ tau1, theta }) => slowLoad(tau1, theta),
    }),
    row('third-order-real', 'PID', {
      settings: ({ k, tau1, tau2, tau3, theta }) => magnitudeOptimumPid(k, tau1, tau2, tau3 + theta),
      warnings: ({ tau1, tau3, theta }) => slowLoad(tau1, tau3 + theta),
    }),
  ],
});

/** PID of the magnitude optimum for main lags T1, T2 and the sum of the small ones, all in s. */
export function magnitudeOptimumPid(k: number, t1S: number, t2S: number, smallLagsS: number) {
  return series(t1S / (2 * k * smallLagsS), t1S, t2S);
}

function pi(k: number, t1S: number, smallLagsS: number) {
  return ideal(t1S / (2 * k * smallLagsS), t1S);
}

function smallLag(theta: number): string | null {
  return theta > 0
    ? null
    : 'The rule divides by Tσ, the sum of the lags and dead times that it does not compensate, and here none is left.';
}

function slowLoad(t1S: number, smallLagsS: number): string[] {
  return t1S > LAG_RATIO * smallLagsS
    ? ['The main lag is more than 4 times Tσ: the loop recovers slowly from load changes.']
    : [];
}
