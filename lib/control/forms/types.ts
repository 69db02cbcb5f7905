import type { IdealController } from '../types';

/**
 * Parallel (independent) form: kp·e + ki·∫e + kd·de/dt. Output unit over input unit for kp, per second for ki,
 * times seconds for kd. ki = 0 switches the integral off, kd = 0 the derivative.
 */
export interface ParallelForm {
  readonly form: 'parallel';
  readonly kp: number;
  readonly ki: number;
  readonly kd: number;
  /** Time constant of the derivative filter in s; the filter belongs to the derivative, not to kd. */
  readonly filterTimeS: number;
}

/**
 * Series (interacting) form: kc·(1 + 1/(tI s))·(1 + tD s)/(1 + lag s), times in seconds.
 * lagS = 0 is the series form without a filter.
 */
export interface SeriesForm {
  readonly form: 'series';
  readonly kc: number;
  readonly tI: number;
  readonly tD: number;
  readonly lagS: number;
}

/** Position controller P over velocity controller PI, as drives have it. Gains in their own units, times in seconds. */
export interface CascadeForm {
  readonly form: 'cascade';
  /** Output per velocity error. */
  readonly velocityGain: number;
  /** Integral time of the velocity controller in s; Infinity = none. */
  readonly velocityIntegralTimeS: number;
  /** Velocity demand per position error, 1/s. */
  readonly positionGain: number;
}

export type ControllerForm = 'ideal' | 'parallel' | 'series';

export type GainUnit =
  /** Output unit per input unit; % of output span per % of input span when both spans are given. */
  | 'gain'
  /** 100 / (gain in % per %), % of the input span. */
  | 'proportional-band'
  /** Input range that drives the output over its whole span, in the input unit. */
  | 'throttling-range'
  /** % of the output span per input unit. */
  | 'percent-per-unit'
  /** Share of the output span (0 to 1) per input unit. */
  | 'fraction-per-unit'
  /** Output counts per input count. */
  | 'counts';

export type IntegralUnit =
  | 'seconds'
  | 'milliseconds'
  | 'minutes'
  | 'repeats-per-second'
  | 'repeats-per-minute'
  | 'repeats-per-hour'
  /** Gain over integral time, per second. */
  | 'gain'
  | 'gain-per-minute'
  /** Gain · sample time / integral time. */
  | 'per-sample';

export type DerivativeUnit =
  | 'seconds'
  | 'milliseconds'
  | 'minutes'
  /** Gain · derivative time, in seconds. */
  | 'gain'
  | 'gain-minutes'
  /** Gain · derivative time / sample time. */
  | 'per-sample';

/** How a device states its derivative filter; without one it has no such parameter, or a fixed one. */
export type FilterUnit =
  | 'ratio'
  | 'inverse-ratio'
  | 'seconds'
  | 'milliseconds'
  | 'hertz'
  | 'radians-per-second'
  /** Share a of the new value in a first-order smoother: Ts/(Tf + Ts). */
  | 'smoothing-factor';

/** Stable keys of a device's parameters: proportional, integral, derivative, derivative filter. */
export type DeviceName = 'p' | 'i' | 'd' | 'f';

/** One value for every parameter, or one each. */
export type PerRow<T> = T | Readonly<Partial<Record<DeviceName, T>>>;

/** How a target controller wants its parameters. Plain data, so that it can be kept in versions. */
export interface Convention {
  readonly form: ControllerForm;
  readonly gain: GainUnit;
  readonly integral: IntegralUnit;
  readonly derivative: DerivativeUnit;
  /** A parameter for the derivative filter; a series device then has it as lag on its derivative factor. */
  readonly filter?: FilterUnit;
  /** Cycle time of the algorithm in s. */
  readonly sampleTimeS?: number;
  /** Span of the measurement in its unit, and of the output in its unit. */
  readonly inputSpan?: number;
  readonly outputSpan?: number;
  /** Counts that stand for the two spans. */
  readonly inputCounts?: number;
  readonly outputCounts?: number;
  /** The device stores value·scale, e.g. 4096 for twelve fractional bits. */
  readonly scale?: PerRow<number>;
  /** The stored number is whole. */
  readonly integer?: boolean;
  /** Resolution of the stored number: a step, or decimals, or significant digits. The step wins. */
  readonly step?: PerRow<number>;
  readonly decimals?: PerRow<number>;
  readonly significant?: PerRow<number>;
  /** Range the device accepts. */
  readonly limits?: Readonly<Partial<Record<DeviceName, { readonly low?: number; readonly high?: number }>>>;
  /**
   * Setting beside a positive gain: 'reverse' = measurement up, output down (error = set-point − measurement),
   * 'direct' = measurement up, output up. Without it the gain carries the sign.
   */
  readonly action?: 'direct' | 'reverse';
  /** What is entered to switch a term off where its own unit has no number for it, or the device wants another. */
  readonly offCodes?: Readonly<Partial<Record<'i' | 'd', number>>>;
}

export type Direction = 'larger = stronger' | 'larger = weaker';

/** One parameter as the device wants it. */
export interface DeviceRow {
  readonly name: DeviceName;
  /** Trade wording, e.g. 'Proportional band'. */
  readonly label: string;
  /** The number to be entered, rounded to the device's resolution when the convention states one. */
  readonly value: number;
  /** The same before rounding. */
  readonly exact: number;
  /** `value` as shown: the device's decimals, or six significant digits when its resolution is not stated. */
  readonly text: string;
  readonly unit: string;
  readonly direction: Direction;
  /** How the term is switched off here, e.g. 'off: enter 0'; missing for terms that cannot be, or when unknown. */
  readonly off?: string;
  /** The term is meant to be off. */
  readonly isOff: boolean;
  /** Rounding took the value to zero or onto the off code although the term is meant to act. */
  readonly roundsToOff: boolean;
  /** The value lies outside the range that the device accepts. */
  readonly outsideLimits: boolean;
  /** (value − exact)/exact; 0 when nothing was rounded or the term is off. */
  readonly relativeRounding: number;
}

export interface DeviceValues {
  readonly rows: readonly DeviceRow[];
  /** Sentences for the reader. */
  readonly warnings: readonly string[];
}

export type FormsCode =
  | 'NO_SERIES_FORM'
  | 'NO_CASCADE_FORM'
  | 'NO_IDEAL_FORM'
  | 'SPAN_NEEDED'
  | 'COUNTS_NEEDED'
  | 'SAMPLE_TIME_NEEDED'
  | 'WRONG_ACTION'
  | 'ZERO_GAIN'
  | 'MISSING_VALUE'
  | 'IMPOSSIBLE_VALUE';

/** A conversion, or why there is none; `closest` is the nearest controller that the form can carry. */
export type Conversion<T> =
  | { readonly ok: true; readonly value: T }
  | {
      readonly ok: false;
      readonly code: FormsCode;
      readonly message: string;
      readonly at?: number;
      readonly closest?: IdealController;
    };

/** Units of the axis: what is measured and what the controller puts out. */
export interface AxisUnits {
  readonly input: string;
  readonly output: string;
}
