import { formatNumber } from '../../units';
import { parallel, type NativeSettings } from './native';
import { defineRule, row } from './row';
import { CALM_FACTOR } from './setting-range';
import type { SettingRange } from './types';

/** Third pole of the PID rows at −α·ω. */
const ALPHA = 1;
/** Recommended natural frequency over the least one that the formulas allow. */
const OVER_LEAST = 5;
/**
 * Largest products of natural frequency and dead time at the recommendation and at the sharp end: the rule leaves the
 * dead time out, and beyond them the sensitivity peak passes about 2 and 4 (own computation on the rows below).
 */
const DEAD_TIME_LIMIT = 0.15;
const SHARP_DEAD_TIME_LIMIT = 0.25;
/** Calm end over the least natural frequency, so that every position of the dial has a controller. */
const CALM_OVER_LEAST = 1.25;

/**
 * Pole placement, exact without dead time, in the parallel form. PI on k/(τs + 1): kp = (2ζωτ − 1)/k, ki = ω²τ/k ·
 * PI on k/s: kp = 2ζω/k, ki = ω²/k · PD on b/(s(s + a)): kp = ω²/b, kd = (2ζω − a)/b · PID on b/(s² + a1 s + a0):
 * poles of (s² + 2ζωs + ω²)(s + αω), see `placedPid`, here with α = 1.
 */
export const polePlacement = defineRule({
  id: 'pole-placement',
  name: 'Pole placement',
  types: ['PI', 'PD', 'PID'],
  aim: 'Closed-loop poles with the wanted damping ratio and natural frequency.',
  form: 'parallel',
  validity:
    'First- and second-order and integrating plants without dead time; the dead time is left out, so keep ω·θ small.',
  source: 'Comparison of coefficients, in any control text',
  setting: {
    name: 'natural_frequency',
    symbol: 'ω',
    unit: 'rad/s',
    recommended:
      'No source names one; 5 times the least frequency that the formulas allow, at most 0.15/θ, with a damping ratio of 0.7.',
  },
  variants: [],
  exactOnly: true,
  rows: [
    row('first-order', 'PI', {
      range: ({ tau, theta }, zeta) => range(1 / (2 * zeta * tau), theta),
      settings: ({ k, tau }, w, zeta) =>
        2 * zeta * w * tau > 1
          ? parallel((2 * zeta * w * tau - 1) / k, (w ** 2 * tau) / k, 0)
          : tooSlow(1 / (2 * zeta * tau)),
      warnings: ({ theta }, w) => [...zerosStay(), ...leftOut(theta, w)],
    }),
    row('integrator', 'PI', {
      range: ({ theta }) => range(0, theta),
      settings: ({ k }, w, zeta) => parallel((2 * zeta * w) / k, w ** 2 / k, 0),
      warnings: ({ theta }, w) => [...zerosStay(), ...leftOut(theta, w)],
    }),
    row('integrator-lag', 'PD', {
      range: ({ tau, theta }, zeta) => range(1 / (2 * zeta * tau), theta),
      settings: ({ k, tau }, w, zeta) => pd(k / tau, 1 / tau, w, zeta),
      warnings: ({ theta }, w) => leftOut(theta, w),
    }),
    row('double-integrator', 'PD', {
      range: ({ theta }) => range(0, theta),
      settings: ({ k }, w, zeta) => pd(k, 0, w, zeta),
      warnings: ({ theta }, w) => leftOut(theta, w),
    }),
    row('second-order-real', 'PID', {
      range: ({ tau1, tau2, theta }, zeta) =>
        range(leastForPid((tau1 + tau2) / (tau1 * tau2), 1 / (tau1 * tau2), zeta, ALPHA), theta),
      settings: ({ k, tau1, tau2 }, w, zeta) =>
        placedPid(k / (tau1 * tau2), (tau1 + tau2) / (tau1 * tau2), 1 / (tau1 * tau2), w, zeta, ALPHA),
      warnings: ({ theta }, w) => [...zerosStay(), ...leftOut(theta, w)],
    }),
    row('second-order-complex', 'PID', {
      range: ({ tau, zeta: own, theta }, zeta) =>
        range(leastForPid((2 * own) / tau, 1 / tau ** 2, zeta, ALPHA), theta),
      settings: ({ k, tau, zeta: own }, w, zeta) =>
        placedPid(k / tau ** 2, (2 * own) / tau, 1 / tau ** 2, w, zeta, ALPHA),
      warnings: ({ theta }, w) => [...zerosStay(), ...leftOut(theta, w)],
    }),
    row('integrator-lag', 'PID', {
      range: ({ tau, theta }, zeta) => range(leastForPid(1 / tau, 0, zeta, ALPHA), theta),
      settings: ({ k, tau }, w, zeta) => placedPid(k / tau, 1 / tau, 0, w, zeta, ALPHA),
      warnings: ({ theta }, w) => [...zerosStay(), ...leftOut(theta, w)],
    }),
    row('double-integrator', 'PID', {
      range: ({ theta }) => range(0, theta),
      settings: ({ k }, w, zeta) => placedPid(k, 0, 0, w, zeta, ALPHA),
      warnings: ({ theta }, w) => [...zerosStay(), ...leftOut(theta, w)],
    }),
  ],
});

/**
 * PID that puts the poles of b/(s² + a1 s + a0) at the roots of (s² + 2ζωs + ω²)(s + αω):
 * kp = (ω²(1 + 2ζα) − a0)/b, ki = αω³/b, kd = (αω + 2ζω − a1)/b.
 *
 * @param w natural frequency ω in rad/s, > 0
 * @param zeta damping ratio, > 0
 * @param alpha third pole over ω, > 0
 * @returns the settings, or a sentence when the wanted loop is so slow that a gain would take the wrong sign
 */
export function placedPid(
  b: number,
  a1: number,
  a0: number,
  w: number,
  zeta: number,
  alpha: number,
): NativeSettings | string {
  const kp = w ** 2 * (1 + 2 * zeta * alpha) - a0;
  const kd = alpha * w + 2 * zeta * w - a1;
  if (!(kp > 0) || kd < 0) return tooSlow(leastForPid(a1, a0, zeta, alpha));
  return parallel(kp / b, (alpha * w ** 3) / b, kd / b);
}

function pd(b: number, a: number, w: number, zeta: number): NativeSettings | string {
  const kd = 2 * zeta * w - a;
  return kd < 0 ? tooSlow(a / (2 * zeta)) : parallel(w ** 2 / b, 0, kd / b);
}

/** Natural frequency from which on both kp and kd have the sign of the plant gain. */
function leastForPid(a1: number, a0: number, zeta: number, alpha: number): number {
  return Math.max(Math.sqrt(a0 / (1 + 2 * zeta * alpha)), a1 / (alpha + 2 * zeta));
}

function range(least: number, theta: number): SettingRange | string | null {
  const fromPlant = least > 0 ? OVER_LEAST * least : Infinity;
  const recommended = theta > 0 ? Math.min(fromPlant, DEAD_TIME_LIMIT / theta) : fromPlant;
  if (recommended === Infinity) return null;
  const calmest = CALM_OVER_LEAST * least;
  if (recommended < calmest) {
    return 'The rule leaves the dead time out, and this one is too long for that beside the lags of the plant';
  }
  return {
    recommended,
    calm: Math.max(recommended / CALM_FACTOR, calmest),
    sharp: theta > 0 ? Math.min(2 * recommended, SHARP_DEAD_TIME_LIMIT / theta) : 2 * recommended,
    note: 'No source recommends a natural frequency; the middle of the dial is the choice of this program.',
  };
}

function tooSlow(least: number): string {
  return `The wanted loop is slower than the plant itself, so a gain would take the wrong sign: the natural frequency must be above ${formatNumber(least)} rad/s.`;
}

function zerosStay(): string[] {
  return [
    'The zeros of the controller stay, so a set-point step overshoots more than the damping ratio says.',
  ];
}

function leftOut(theta: number, w: number): string[] {
  if (theta === 0) return [];
  const degrees = formatNumber((w * theta * 180) / Math.PI, { significant: 2 });
  return [`The rule leaves the dead time out, which costs ${degrees}° of phase at the natural frequency.`];
}
