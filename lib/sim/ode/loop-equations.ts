import type { IdealController, MeasurementFilter } from '../../control/types';
import type { PlantStates } from './plant-states';

/** What drives the loop and what limits it, in units of the signal scale and of the dimensionless time. */
export interface Excitation {
  readonly setpoint: number;
  readonly load: number;
  readonly low: number;
  readonly high: number;
  /** Largest rate of change of the output. */
  readonly slew: number;
}

/**
 * What holds the controller output: nothing, a limit, or the rate limit upwards or downwards. Frozen while the solver
 * runs, so that it sees smooth equations.
 */
export type LimitMode = 'free' | 'low' | 'high' | 'rising' | 'falling';

/**
 * The loop as first-order equations in the dimensionless time x = t/timeUnitS. State vector: the plant's states, the
 * integral term, the derivative's lag, the states of the measurement filter, the output while its rate is limited
 * (those that exist).
 *
 * The controller output v is divided by kp here (v = b·r − yf + integral + derivative), the plant is multiplied by it:
 * every signal is then of the size of y.
 */
export class LoopEquations {
  readonly dimension: number;
  /** Indices of the states that y and the controller output are made of. */
  readonly visible: number[];
  readonly limited: boolean;
  /** Index of the output's own state, −1 without a rate limit. */
  readonly ramp: number = -1;
  mode: LimitMode = 'free';
  /** Results of `resolve`: plant output, controller output before and after the limits. */
  y = 0;
  v = 0;
  output = 0;
  /** y behind the measurement filter. */
  measured = 0;
  private plantInput = 0;
  private readonly slopes: number[];
  private readonly integral: number = -1;
  private readonly lag: number = -1;
  private readonly filter: number = -1;
  /** v falls by this factor of yf at once. */
  private readonly slope: number;
  private readonly integralRate: number;
  private readonly lagRate: number;
  private readonly filterRate: number;
  private readonly trackingRate: number;

  constructor(
    private readonly plant: PlantStates,
    private readonly controller: IdealController,
    readonly excitation: Excitation,
    private readonly hasDeadTime: boolean,
    timeUnitS: number,
    trackingTimeS: number,
  ) {
    const { ti, td, n, filter } = controller;
    let next = plant.order;
    if (Number.isFinite(ti)) this.integral = next++;
    if (td > 0) this.lag = next++;
    if (filter) {
      this.filter = next;
      next += filter.order;
    }
    if (Number.isFinite(excitation.slew)) this.ramp = next++;
    // The solver wants at least one equation; a pure dead time with a P controller has none.
    this.dimension = Math.max(next, 1);
    this.limited = excitation.low > -Infinity || excitation.high < Infinity || this.ramp >= 0;
    // Index 0 is the plant's first state, or stands in where there is no state at all.
    const visible = [...new Set([0, this.integral, this.lag, this.filter].filter((i) => i >= 0))];
    this.slopes = new Array<number>(this.dimension).fill(0);
    // The rate of the output depends on every state.
    this.visible = this.ramp >= 0 ? this.slopes.map((_, index) => index) : visible;
    this.slope = td > 0 ? 1 + n : 1;
    this.integralRate = timeUnitS / ti;
    this.lagRate = td > 0 ? (timeUnitS * n) / td : 0;
    this.filterRate = filter ? timeUnitS / filter.timeConstantS : 0;
    this.trackingRate = timeUnitS / trackingTimeS;
  }

  /**
   * Solves for y and the controller output at one moment. `delayedInput` is what reaches the plant after the dead
   * time; without dead time it is ignored and the loop through the plant's direct part is closed here.
   */
  resolve(state: ArrayLike<number>, delayedInput: number): void {
    const { plant, excitation } = this;
    const fromStates = plant.order > 0 ? state[0] : 0;
    const filtered = this.filter >= 0 ? state[this.filter] : 0;
    const offset = this.offset(state);
    if (this.hasDeadTime) {
      this.plantInput = delayedInput;
      this.y = fromStates + plant.direct * delayedInput;
    } else if (this.filter < 0 && this.mode === 'free') {
      this.y = (fromStates + plant.direct * (offset + excitation.load)) / (1 + plant.direct * this.slope);
    } else {
      this.plantInput = this.held(state, offset - this.slope * filtered) + excitation.load;
      this.y = fromStates + plant.direct * this.plantInput;
    }
    this.measured = this.filter >= 0 ? filtered : this.y;
    this.v = offset - this.slope * this.measured;
    this.output = this.held(state, this.v);
    if (!this.hasDeadTime) this.plantInput = this.output + excitation.load;
  }

  /** Derivative of the state vector; the array is used again by the next call. */
  derivative(state: ArrayLike<number>, delayedInput: number): number[] {
    this.resolve(state, delayedInput);
    const { plant, slopes, controller, excitation } = this;
    const { order, rate, a, b } = plant;
    const first = state[0];
    for (let i = 0; i < order - 1; i += 1) {
      slopes[i] = rate * (state[i + 1] - a[i] * first + b[i] * this.plantInput);
    }
    if (order > 0) slopes[order - 1] = rate * (b[order - 1] * this.plantInput - a[order - 1] * first);
    if (this.integral >= 0) {
      slopes[this.integral] = this.integralRate * (excitation.setpoint - this.measured);
      if (this.mode !== 'free') slopes[this.integral] += this.trackingRate * (this.output - this.v);
    }
    if (this.lag >= 0) {
      slopes[this.lag] =
        this.lagRate * (controller.c * excitation.setpoint - this.measured - state[this.lag]);
    }
    if (this.ramp >= 0) slopes[this.ramp] = this.rampRate();
    if (this.filter >= 0) this.filterSlopes(state, controller.filter as MeasurementFilter);
    return slopes;
  }

  /**
   * dv/dx while nothing holds the output. `delayedRate` is the rate of what reaches the plant after the dead time; it
   * matters for a biproper plant only.
   */
  outputRate(state: ArrayLike<number>, delayedInput: number, delayedRate: number): number {
    const slopes = this.derivative(state, delayedInput);
    const { plant } = this;
    const integral = this.integral >= 0 ? slopes[this.integral] : 0;
    const lag = this.lag >= 0 ? this.controller.n * slopes[this.lag] : 0;
    if (this.filter >= 0) return integral - lag - this.slope * slopes[this.filter];
    const fromStates = plant.order > 0 ? slopes[0] : 0;
    if (this.hasDeadTime) return integral - lag - this.slope * (fromStates + plant.direct * delayedRate);
    return (integral - lag - this.slope * fromStates) / (1 + plant.direct * this.slope);
  }

  private rampRate(): number {
    if (this.mode === 'rising') return this.excitation.slew;
    return this.mode === 'falling' ? -this.excitation.slew : 0;
  }

  private filterSlopes(state: ArrayLike<number>, filter: MeasurementFilter): void {
    const { slopes, filterRate } = this;
    const at = this.filter;
    if (filter.order === 1) {
      slopes[at] = filterRate * (this.y - state[at]);
      return;
    }
    // 1 + Tf s + (Tf s)²/2 with the second state Tf·dyf/dt.
    slopes[at] = filterRate * state[at + 1];
    slopes[at + 1] = 2 * filterRate * (this.y - state[at] - state[at + 1]);
  }

  /** The part of v that does not depend on yf. */
  private offset(state: ArrayLike<number>): number {
    const { controller, excitation } = this;
    let offset = controller.b * excitation.setpoint;
    if (this.integral >= 0) offset += state[this.integral];
    if (this.lag >= 0) offset += controller.n * (controller.c * excitation.setpoint - state[this.lag]);
    return offset;
  }

  private held(state: ArrayLike<number>, v: number): number {
    switch (this.mode) {
      case 'free':
        return v;
      case 'low':
        return this.excitation.low;
      case 'high':
        return this.excitation.high;
      default:
        return state[this.ramp];
    }
  }
}
