import type { Actuator, IdealController } from '../../control/types';

/**
 * The controller as a program runs it, once per sample: derivative by backward difference with its filter, integral by
 * forward Euler (an error acts on it from the next sample on), limits with back-calculation of the whole unlimited
 * output. With a rate limit the output moves by at most slew·h from one sample to the next, the first time from 0.
 */
export class SampledLaw {
  private integral = 0;
  private derivative = 0;
  private lastDifference = 0;
  private last = 0;

  constructor(
    private readonly controller: IdealController,
    private readonly actuator: Actuator,
    private readonly sampleTimeS: number,
    private readonly trackingTimeS: number,
  ) {}

  /** The output to be held until the next sample, for a set-point and the filtered measurement of this one. */
  next(r: number, measured: number): number {
    const { kp, ti, td, n, b, c } = this.controller;
    const { low = -Infinity, high = Infinity, slew = Infinity } = this.actuator;
    const h = this.sampleTimeS;
    const difference = c * r - measured;
    if (td > 0)
      this.derivative =
        (td * this.derivative + kp * td * n * (difference - this.lastDifference)) / (td + n * h);
    this.lastDifference = difference;
    const v = kp * (b * r - measured) + this.integral + this.derivative;
    const within = Math.min(Math.max(v, low), high);
    const held = Math.min(Math.max(within, this.last - slew * h), this.last + slew * h);
    this.last = held;
    if (Number.isFinite(ti))
      this.integral += h * ((kp / ti) * (r - measured) + (held - v) / this.trackingTimeS);
    return held;
  }
}
