import { formatNumber, formatTimeS } from '../../units';
import { DEFAULT_DERIVATIVE_FILTER, type IdealController } from '../types';
import type { ControllerRest } from './parallel';
import type { Conversion, SeriesForm } from './types';

/** Rounding of the closest realisable controller may leave the discriminant this far below 0. */
const DISCRIMINANT_CRUMB = 1e-12;

/**
 * Ideal to series form without a filter:
 * kc = kp/2·(1 + √(1 − 4 td/ti)), tI and tD = ti/2·(1 ± √(1 − 4 td/ti)).
 *
 * @param controller ideal form; the derivative filter is left out (see idealToSeriesWithLag)
 * @returns NO_SERIES_FORM when ti < 4 td, with the closest controller that has one: td reduced to ti/4
 */
export function idealToSeries(controller: IdealController): Conversion<SeriesForm> {
  const { kp, ti, td } = controller;
  if (ti < 4 * td) return noSeries(controller, ti / 4);
  const root = Math.sqrt(1 - (4 * td) / ti);
  // 2 td/(1 + √) is ti/2·(1 − √) without the cancellation, and holds for ti = ∞ too.
  const value: SeriesForm = {
    form: 'series',
    kc: (kp / 2) * (1 + root),
    tI: (ti / 2) * (1 + root),
    tD: (2 * td) / (1 + root),
    lagS: 0,
  };
  return { ok: true, value };
}

/**
 * Ideal to series form with the derivative filter as lag (1 + lag s) below the derivative factor; the response is the
 * same. With tf = td/n: lag = tf, tI + tD = ti + tf, tI·tD = ti·(td + tf), kc = kp·tI/ti.
 *
 * @param controller ideal form
 * @returns NO_SERIES_FORM when tI and tD would be complex, with td reduced to the largest that has a series form
 */
export function idealToSeriesWithLag(controller: IdealController): Conversion<SeriesForm> {
  const { kp, ti, td, n } = controller;
  const lagS = td / n;
  if (td === 0 || lagS === 0) return idealToSeries(controller);
  if (ti === Infinity) return { ok: true, value: { form: 'series', kc: kp, tI: ti, tD: td + lagS, lagS } };
  const sum = ti + lagS;
  const product = ti * (td + lagS);
  const discriminant = 1 - (4 * product) / (sum * sum);
  if (discriminant < -DISCRIMINANT_CRUMB) return noSeries(controller, ti * largestDerivativeShare(n));
  const root = Math.sqrt(Math.max(0, discriminant));
  const tI = (sum / 2) * (1 + root);
  return {
    ok: true,
    value: { form: 'series', kc: (kp * tI) / ti, tI, tD: (2 * product) / (sum * (1 + root)), lagS },
  };
}

/** Largest x = td/ti with (1 + x/n)² ≥ 4 x (1 + 1/n): smaller root of x²/n² − (4 + 2/n) x + 1; 1/4 without a filter. */
function largestDerivativeShare(n: number): number {
  const linear = 4 + 2 / n;
  return 2 / (linear + Math.sqrt(linear * linear - 4 / (n * n)));
}

function noSeries(controller: IdealController, closestTd: number): Conversion<never> {
  const { ti, td } = controller;
  const ratio = formatNumber(ti / closestTd, { significant: 3 });
  const message =
    `The series form needs an integral time of at least ${ratio} times the derivative time; ` +
    `${formatTimeS(ti)} and ${formatTimeS(td)} have none. Closest: reduce the derivative time to ${formatTimeS(closestTd)}.`;
  return { ok: false, code: 'NO_SERIES_FORM', message, closest: { ...controller, td: closestTd } };
}

/**
 * Series to ideal form, exact with the lag: ti = tI + tD − lag, kp = kc·ti/tI, td = tI·tD/ti − lag, filter time lag.
 *
 * @param series times in s, tI > 0 (Infinity = no integral), tD ≥ 0, lagS ≥ 0
 * @param rest what the form does not carry; its n counts when lagS = 0
 * @returns NO_IDEAL_FORM when the lag outweighs the derivative factor (td would be negative)
 */
export function seriesToIdeal(series: SeriesForm, rest: ControllerRest = {}): Conversion<IdealController> {
  const { kc, tI, tD, lagS } = series;
  const ti = tI + tD - lagS;
  const td = tI === Infinity ? tD - lagS : (tI * tD) / ti - lagS;
  if (!(ti > 0) || td < 0) {
    const message =
      `A lag of ${formatTimeS(lagS)} on a derivative factor of ${formatTimeS(tD)} and an integral time of ` +
      `${formatTimeS(tI)} is no PID in the ideal form; the lag must be shorter than the derivative time.`;
    return { ok: false, code: 'NO_IDEAL_FORM', message };
  }
  const kp = tI === Infinity ? kc : (kc * ti) / tI;
  const n = lagS > 0 && td > 0 ? td / lagS : (rest.n ?? DEFAULT_DERIVATIVE_FILTER);
  return { ok: true, value: { b: 1, c: 0, ...rest, kp, ti, td, n } };
}
