import type { IdealController } from '../../control/types';
import type { Excitation } from './loop-equations';

/**
 * The controller as a program runs it, once per sample (v divided by kp, like everything in this engine):
 * derivative by backward difference with its filter, integral by forward Euler, so that an error acts on the integral
 * only from the next sample on, back-calculation with the whole unlimited v.
 */
export class SampledLaw {
  private integral = 0;
  private derivative = 0;
  private lastDifference = 0;

  constructor(
    private readonly controller: IdealController,
    private readonly excitation: Excitation,
    private readonly sampleTimeS: number,
    private readonly trackingTimeS: number,
  ) {}

  /** Takes the measurement of this sample, returns the output to be held until the next one. */
  next(measured: number): number {
    const { ti, td, n, b, c } = this.controller;
    const { setpoint, low, high } = this.excitation;
    const h = this.sampleTimeS;
    const difference = c * setpoint - measured;
    if (td > 0) {
      this.derivative = (td * this.derivative + td * n * (difference - this.lastDifference)) / (td + n * h);
    }
    this.lastDifference = difference;
    const v = b * setpoint - measured + this.integral + this.derivative;
    const held = Math.min(Math.max(v, low), high);
    if (Number.isFinite(ti))
      this.integral += h * ((setpoint - measured) / ti + (held - v) / this.trackingTimeS);
    return held;
  }
}
