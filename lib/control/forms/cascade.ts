import { formatTimeS } from '../../units';
import type { IdealController } from '../types';
import type { CascadeForm, Conversion } from './types';

/** 1/s in one unit of the position gain. The unit in Hz is a bandwidth: 2π of it in rad/s. */
export const POSITION_GAIN_UNITS = {
  'per-second': { perSecond: 1, unit: '1/s' },
  'per-minute': { perSecond: 1 / 60, unit: '1/min' },
  'per-millisecond': { perSecond: 1000, unit: '1/ms' },
  hertz: { perSecond: 2 * Math.PI, unit: 'Hz' },
  'metres-per-minute-per-millimetre': { perSecond: 1000 / 60, unit: '(m/min)/mm' },
  'inches-per-minute-per-mil': { perSecond: 1000 / 60, unit: '(in/min)/mil' },
} as const;

export type PositionGainUnit = keyof typeof POSITION_GAIN_UNITS;

/**
 * Position P over velocity PI, as one PID with set-point weights:
 * kp = Kvel·(Kpos + 1/Tn), ki = Kvel·Kpos/Tn, kd = Kvel, b = Kpos/(Kpos + 1/Tn), c = 0; the derivative has no filter.
 *
 * @param cascade position gain in 1/s > 0; velocity integral time in s > 0, Infinity = none (a PD, then)
 */
export function cascadeToIdeal(cascade: CascadeForm): IdealController {
  const { velocityGain, velocityIntegralTimeS, positionGain } = cascade;
  const velocityRate = 1 / velocityIntegralTimeS;
  const sum = positionGain + velocityRate;
  const ti = velocityRate === 0 ? Infinity : sum / (positionGain * velocityRate);
  return { kp: velocityGain * sum, ti, td: 1 / sum, n: Infinity, b: positionGain / sum, c: 0 };
}

/**
 * A PID as position P over velocity PI. Kpos + 1/Tn = 1/td and Kpos/Tn = 1/(ti·td) leave two answers; the one whose
 * set-point weight lies nearer to the controller's b is taken.
 *
 * @param controller ideal form with integral and derivative (ti = Infinity gives Tn = Infinity)
 * @returns NO_CASCADE_FORM without derivative or when ti < 4 td; `closest` then has td = ti/4
 */
export function idealToCascade(controller: IdealController): Conversion<CascadeForm> {
  const { kp, ti, td, b } = controller;
  if (td === 0) {
    const message =
      'A cascade of position and velocity controller needs a derivative: its velocity gain is kp · td.';
    return { ok: false, code: 'NO_CASCADE_FORM', message };
  }
  if (ti < 4 * td) {
    const message =
      `A cascade needs an integral time of at least 4 times the derivative time; ${formatTimeS(ti)} and ` +
      `${formatTimeS(td)} have none. Closest: reduce the derivative time to ${formatTimeS(ti / 4)}.`;
    return { ok: false, code: 'NO_CASCADE_FORM', message, closest: { ...controller, td: ti / 4 } };
  }
  const root = Math.sqrt(1 - (4 * td) / ti);
  const fast = (1 + root) / (2 * td);
  const slow = 2 / (ti * (1 + root));
  const fastIsPosition = slow === 0 || Math.abs(fast * td - b) < Math.abs(slow * td - b);
  const [positionGain, velocityRate] = fastIsPosition ? [fast, slow] : [slow, fast];
  return {
    ok: true,
    value: { form: 'cascade', velocityGain: kp * td, velocityIntegralTimeS: 1 / velocityRate, positionGain },
  };
}
