import { DEFAULT_DERIVATIVE_FILTER, type IdealController } from '../types';
import type { Conversion, ParallelForm } from './types';

/** What a target's P, I and D parameters do not carry: filter ratio, set-point weights, measurement filter. */
export type ControllerRest = Partial<Pick<IdealController, 'n' | 'b' | 'c' | 'filter'>>;

/**
 * Ideal to parallel form: ki = kp/ti, kd = kp·td; the derivative filter time constant is td/n.
 *
 * @param controller ideal form; ti = Infinity gives ki = 0
 */
export function idealToParallel(controller: IdealController): ParallelForm {
  const { kp, ti, td, n } = controller;
  return { form: 'parallel', kp, ki: kp / ti, kd: kp * td, filterTimeS: td / n };
}

/**
 * Parallel to ideal form: ti = kp/ki, td = kd/kp, n = td/filterTimeS.
 *
 * @param parallel gains of one sign
 * @param rest what the form does not carry; its n counts only when there is no derivative
 * @returns ZERO_GAIN for kp = 0 (pure integral control has no ideal form), NO_IDEAL_FORM for gains of mixed sign
 */
export function parallelToIdeal(
  parallel: ParallelForm,
  rest: ControllerRest = {},
): Conversion<IdealController> {
  const { kp, ki, kd, filterTimeS } = parallel;
  if (kp === 0) {
    const message =
      'A proportional gain of 0 has no ideal form: its integral time and derivative time would be 0 · ∞.';
    return { ok: false, code: 'ZERO_GAIN', message };
  }
  if (kp * ki < 0 || kp * kd < 0) {
    const message = `The gains ${kp}, ${ki}, ${kd} are of mixed sign; the ideal form needs one sign for all of them.`;
    return { ok: false, code: 'NO_IDEAL_FORM', message };
  }
  const td = kd === 0 ? 0 : kd / kp;
  const n = td === 0 ? (rest.n ?? DEFAULT_DERIVATIVE_FILTER) : td / filterTimeS;
  return { ok: true, value: { b: 1, c: 0, ...rest, kp, ti: ki === 0 ? Infinity : kp / ki, td, n } };
}
