import { ideal, series } from './native';
import { defineRule, row } from './row';
import { CALM_FACTOR } from './setting-range';
import type { SettingRange } from './types';

/** Kessler's a: the crossover lies at 1/(a·Tσ). */
const KESSLER_A = 2;

/**
 * Symmetrical optimum. Tσ is the sum of the small lags and the dead time; a = 2 is Kessler, larger is calmer
 * (damping (a − 1)/2): integrating PI kp = 1/(a k Tσ), ti = a² Tσ · PID in series form kc = 1/(a k Tσ), τI = a² Tσ,
 * τD = T1 · on a lag T1 PI kp = T1/(a k Tσ), ti = a² Tσ.
 * On integrating plants the set-point passes the prefilter 1/(a² Tσ s + 1), which the set-point weight carries:
 * 43 % overshoot without, 8 % with it at a = 2.
 */
export const symmetricalOptimum = defineRule({
  id: 'symmetrical-optimum',
  name: 'Symmetrical optimum',
  types: ['PI', 'PID'],
  aim: 'Load, and set-point through the prefilter (8 % overshoot); speed loops of drives.',
  form: 'series',
  validity: 'Integrating plants with short lags of sum Tσ, and plants with a main lag T1 ≥ 4 Tσ.',
  source: 'Kessler, Regelungstechnik 6 (1958) 395–400 and 432–436 (pages from memory)',
  setting: { name: 'crossover_time', symbol: 'a·Tσ', unit: 's', recommended: '2 Tσ (a = 2).' },
  variants: [],
  rows: [
    row('integrator', 'PI', {
      objection: ({ theta }) => smallLag(theta),
      range: ({ theta }) => range(theta),
      settings: ({ k, theta }, crossoverTimeS) => onIntegrator(k, theta, crossoverTimeS),
      warnings: prefilter,
    }),
    row('integrator-lag', 'PI', {
      range: ({ tau, theta }) => range(tau + theta),
      settings: ({ k, tau, theta }, crossoverTimeS) => onIntegrator(k, tau + theta, crossoverTimeS),
      warnings: prefilter,
    }),
    row('integrator-two-lags', 'PI', {
      range: ({ tau1, tau2, theta }) => range(tau1 + tau2 + theta),
      settings: ({ k, tau1, tau2, theta }, crossoverTimeS) =>
        onIntegrator(k, tau1 + tau2 + theta, crossoverTimeS),
      warnings: prefilter,
    }),
    row('integrator-lag', 'PID', {
      objection: ({ theta }) => smallLag(theta),
      range: ({ theta }) => range(theta),
      settings: ({ k, tau, theta }, crossoverTimeS) => withDerivative(k, tau, theta, crossoverTimeS),
      warnings: prefilter,
    }),
    row('integrator-two-lags', 'PID', {
      range: ({ tau2, theta }) => range(tau2 + theta),
      settings: ({ k, tau1, tau2, theta }, crossoverTimeS) =>
        withDerivative(k, tau1, tau2 + theta, crossoverTimeS),
      warnings: prefilter,
    }),
    row('first-order', 'PI', {
      objection: ({ theta }) => smallLag(theta),
      range: ({ theta }) => range(theta),
      settings: ({ k, tau, theta }, crossoverTimeS) => onLag(k, tau, theta, crossoverTimeS),
      warnings: ({ tau, theta }, crossoverTimeS) => shortLag(tau, theta, crossoverTimeS),
    }),
    row('second-order-real', 'PI', {
      range: ({ tau2, theta }) => range(tau2 + theta),
      settings: ({ k, tau1, tau2, theta }, crossoverTimeS) => onLag(k, tau1, tau2 + theta, crossoverTimeS),
      warnings: ({ tau1, tau2, theta }, crossoverTimeS) => shortLag(tau1, tau2 + theta, crossoverTimeS),
    }),
    row('third-order-real', 'PI', {
      range: ({ tau2, tau3, theta }) => range(tau2 + tau3 + theta),
      settings: ({ k, tau1, tau2, tau3, theta }, crossoverTimeS) =>
        onLag(k, tau1, tau2 + tau3 + theta, crossoverTimeS),
      warnings: ({ tau1, tau2, tau3, theta }, crossoverTimeS) =>
        shortLag(tau1, tau2 + tau3 + theta, crossoverTimeS),
    }),
  ],
});

/** The integral time a²Tσ from the crossover time a·Tσ. */
function integralTimeS(smallLagsS: number, crossoverTimeS: number): number {
  return crossoverTimeS ** 2 / smallLagsS;
}

function onIntegrator(k: number, smallLagsS: number, crossoverTimeS: number) {
  const ti = integralTimeS(smallLagsS, crossoverTimeS);
  return ideal(1 / (k * crossoverTimeS), ti, 0, { b: 0, prefilterTimeS: ti });
}

function withDerivative(k: number, t1S: number, smallLagsS: number, crossoverTimeS: number) {
  const tI = integralTimeS(smallLagsS, crossoverTimeS);
  // Series PID behind 1/(τI s + 1) passes the set-point on as kc(1 + τD s)/(τI s): weight b below, c = 0.
  return series(1 / (k * crossoverTimeS), tI, t1S, { b: t1S / (tI + t1S), prefilterTimeS: tI });
}

function onLag(k: number, t1S: number, smallLagsS: number, crossoverTimeS: number) {
  return ideal(t1S / (k * crossoverTimeS), integralTimeS(smallLagsS, crossoverTimeS));
}

function range(smallLagsS: number): SettingRange {
  const recommended = KESSLER_A * smallLagsS;
  return {
    recommended,
    calm: CALM_FACTOR * recommended,
    sharp: null,
    ending: 'Below a = 2 the damping (a − 1)/2 falls off quickly, and the source names no such setting.',
    least: { value: recommended, words: 'a ≥ 2' },
  };
}

function prefilter(): string[] {
  return [
    'The set-point weight b stands for the prefilter of the rule; with b = 1 a set-point step overshoots by about 43 %.',
  ];
}

function shortLag(t1S: number, smallLagsS: number, crossoverTimeS: number): string[] {
  return t1S < integralTimeS(smallLagsS, crossoverTimeS) * (1 - 1e-9)
    ? [
        'The main lag is shorter than the integral time: the rule takes the plant for an integrator, which holds only for a longer lag.',
      ]
    : [];
}

function smallLag(theta: number): string | null {
  return theta > 0
    ? null
    : 'The rule divides by Tσ, the sum of the lags and dead times that it does not compensate, and here none is left.';
}
