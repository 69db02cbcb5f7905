import type { IdealController, Plant } from '../control/types';

/** Limits of y for t → ∞ of a stable loop, from its transfer functions at s = 0. */
export interface FinalValues {
  readonly setpoint: number;
  readonly load: number;
}

/**
 * Final values after a unit step of set-point and of load. With N, D the plant, the controller contributes kp(b·s + 1/ti)
 * over s with integral, kp·b over 1 without; its derivative and the
 * measurement filter (gain 1) contribute nothing at s = 0.
 */
export function finalValues(plant: Plant, controller: IdealController): FinalValues {
  const n0 = plant.num[plant.num.length - 1];
  const d0 = plant.den[plant.den.length - 1];
  const { kp, ti, b } = controller;
  const hasIntegral = Number.isFinite(ti) && kp !== 0;
  const [feedback0, setpoint0, below0] = hasIntegral ? [kp / ti, kp / ti, 0] : [kp, kp * b, 1];
  const characteristic = d0 * below0 + n0 * feedback0;
  return { setpoint: (n0 * setpoint0) / characteristic, load: (n0 * below0) / characteristic };
}
