import { formatTimeS } from '../../units';
import { ideal, integral, series } from './native';
import { defineRule, needsDeadTime, row } from './row';
import { closedLoopTime } from './setting-range';
import type { SettingRange } from './types';

/** Without dead time the source's τc = θ says nothing; a third of the main lag is common practice. */
const LAG_SHARE_WITHOUT_DEAD_TIME = 1 / 3;

/**
 * SIMC: kc = τ1/(k(τc + θ)), τI = min(τ1, 4(τc + θ)), τD = τ2 in the series form; integrating plants as the limit of
 * a long τ1. τc = θ is the tight setting (Ms about 1.6), longer is smoother.
 * Variant 'improved': PI with τ1 + θ/3 in place of τ1.
 */
export const simc = defineRule({
  id: 'simc',
  name: 'SIMC',
  types: ['I', 'PI', 'PID'],
  aim: 'Set-point and load with good robustness, Ms about 1.6 to 1.7 at τc = θ.',
  form: 'series',
  validity: 'Any θ/τ; PID for second-order plants, worth its derivative where τ2 > θ.',
  source:
    'Skogestad, Simple analytic rules for model reduction and PID controller tuning, Journal of Process Control 13 (2003) 291–309',
  setting: { name: 'tau_c', symbol: 'τc', unit: 's', recommended: 'τc = θ.' },
  variants: [
    {
      id: 'improved',
      name: 'Improved SIMC, PI',
      source:
        'Skogestad & Grimholt, The SIMC method for smooth PID controller tuning, in Vilanova & Visioli (eds), PID Control in the Third Millennium, Springer 2012, chapter 5',
    },
  ],
  rows: [
    row('first-order', 'PI', {
      range: ({ tau, theta }) => range(theta, tau),
      settings: ({ k, tau, theta }, tauC) => pi(k, tau, tauC + theta),
    }),
    row('first-order', 'PI', {
      variant: 'improved',
      range: ({ tau, theta }) => range(theta, tau),
      settings: ({ k, tau, theta }, tauC) => pi(k, tau + theta / 3, tauC + theta),
    }),
    row('second-order-real', 'PID', {
      range: ({ tau1, theta }) => range(theta, tau1),
      settings: ({ k, tau1, tau2, theta }, tauC) =>
        series(tau1 / (k * (tauC + theta)), Math.min(tau1, 4 * (tauC + theta)), tau2),
      warnings: ({ tau2, theta }) =>
        tau2 > theta
          ? []
          : [
              `The derivative gains little here: the second lag, ${formatTimeS(tau2)}, is not longer than the dead time, ${formatTimeS(theta)}.`,
            ],
    }),
    row('integrator', 'PI', {
      range: ({ theta }) => range(theta, 0),
      settings: ({ k, theta }, tauC) => integrating(k, tauC + theta),
    }),
    row('integrator', 'PI', {
      variant: 'improved',
      range: ({ theta }) => range(theta, 0),
      settings: ({ k, theta }, tauC) => integrating(k, tauC + theta),
    }),
    row('integrator-lag', 'PID', {
      range: ({ tau, theta }) => range(theta, tau),
      settings: ({ k, tau, theta }, tauC) => series(1 / (k * (tauC + theta)), 4 * (tauC + theta), tau),
    }),
    row('double-integrator', 'PID', {
      range: ({ theta }) => range(theta, 0),
      settings: ({ k, theta }, tauC) => {
        const s = tauC + theta;
        return series(1 / (4 * k * s ** 2), 4 * s, 4 * s);
      },
    }),
    row('integrator-zero-lag', 'PI', {
      objection: ({ tz, tau2 }) =>
        tz > tau2 ? null : 'The row for an integrator with zero and lag needs the zero slower than the lag.',
      range: ({ tau2, theta }) => range(theta, tau2),
      settings: ({ k, tz, tau2, theta }, tauC) =>
        ideal(tau2 / (k * tz * (tauC + theta)), Math.min(tau2, 4 * (tauC + theta))),
    }),
    row('gain', 'I', {
      objection: needsDeadTime,
      range: ({ theta }) => range(theta, 0),
      settings: ({ k, theta }, tauC) => integral(1 / (k * (tauC + theta))),
    }),
    row('gain', 'PI', {
      variant: 'improved',
      objection: needsDeadTime,
      range: ({ theta }) => range(theta, 0),
      settings: ({ k, theta }, tauC) => pi(k, theta / 3, tauC + theta),
    }),
  ],
});

function pi(k: number, tau: number, closedLoopS: number) {
  return ideal(tau / (k * closedLoopS), Math.min(tau, 4 * closedLoopS));
}

function integrating(k: number, closedLoopS: number) {
  return ideal(1 / (k * closedLoopS), 4 * closedLoopS);
}

function range(theta: number, lag: number): SettingRange | null {
  if (theta > 0) return closedLoopTime(theta);
  if (lag === 0) return null;
  return closedLoopTime(lag * LAG_SHARE_WITHOUT_DEAD_TIME, null, {
    note: 'The rule recommends τc = θ, which says nothing without dead time; a third of the main lag is taken instead (common practice).',
  });
}
