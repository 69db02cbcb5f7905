import type { IdealController } from '../../control/types';
import type { Excitation } from './loop-equations';

/**
 * The controller as a program runs it, once per sample (v divided by kp, like everything in this engine):
 * derivative by backward difference with its filter, integral by forward Euler, so that an error acts on the integral
 * only from the next sample on, back-calculation with the whole unlimited v;
 * with a rate limit an output moves by at most slew·h from one sample to the next, the first from 0.
 */
export class SampledLaw {
  private integral = 0;
  private derivative = 0;
  private lastDifference = 0;
  private lastHeld = 0;

  constructor(
    private readonly controller: IdealController,
    private readonly excitation: Excitation,
    private readonly times: {
      readonly sampleTimeS: number;
      readonly timeUnitS: number;
      readonly trackingTimeS: number;
    },
  ) {}

  /** Takes the measurement of this sample, returns the output to be held until the next one. */
  next(measured: number): number {
    const { ti, td, n, b, c } = this.controller;
    const { setpoint, low, high, slew } = this.excitation;
    const { sampleTimeS: h, timeUnitS, trackingTimeS } = this.times;
    const difference = c * setpoint - measured;
    if (td > 0) {
      this.derivative = (td * this.derivative + td * n * (difference - this.lastDifference)) / (td + n * h);
    }
    this.lastDifference = difference;
    const v = b * setpoint - measured + this.integral + this.derivative;
    const most = (slew * h) / timeUnitS;
    const within = Math.min(Math.max(v, low), high);
    const held = Math.min(Math.max(within, this.lastHeld - most), this.lastHeld + most);
    this.lastHeld = held;
    if (Number.isFinite(ti)) this.integral += h * ((setpoint - measured) / ti + (held - v) / trackingTimeS);
    return held;
  }
}
