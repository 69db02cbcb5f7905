/**
 * The objects of a control loop. Seconds, rad/s and degrees; polynomials in descending powers of s.
 * Infinite values are `Infinity` here (the API writes "inf"); `null` means "not defined".
 */

/** G(s) = num(s)/den(s) · e^(-deadTimeS·s). Proper: degree of num ≤ degree of den. */
export interface Plant {
  readonly num: readonly number[];
  readonly den: readonly number[];
  /** Dead time in seconds, ≥ 0, exact in every check. */
  readonly deadTimeS: number;
}

/** Low-pass on the measurement: order 1 is 1/(1+Tf s), order 2 is 1/(1+Tf s+(Tf s)²/2). */
export interface MeasurementFilter {
  readonly timeConstantS: number;
  readonly order: 1 | 2;
}

/**
 * Controller in the ideal (ISA standard) form with set-point weights and filtered derivative:
 * v = kp·[(b·r − yf) + (1/ti)·∫(r − yf) + D],  D = td·s/(1 + td·s/n)·(c·r − yf).
 */
export interface IdealController {
  readonly kp: number;
  /** Integral time in seconds, > 0; Infinity switches the integral off. */
  readonly ti: number;
  /** Derivative time in seconds, ≥ 0; 0 switches the derivative off. */
  readonly td: number;
  /** Derivative filter ratio: the filter time constant is td/n. */
  readonly n: number;
  /** Set-point weights of the proportional and the derivative term. */
  readonly b: number;
  readonly c: number;
  readonly filter?: MeasurementFilter;
}

export type ControllerType = 'P' | 'PI' | 'PD' | 'PID';

/** Limits of the actuator, in the axis' output unit. Missing = no limit. */
export interface Actuator {
  readonly low?: number;
  readonly high?: number;
  /** Largest rate of change, units per second. */
  readonly slew?: number;
  /** Back-calculation time constant in s; default √(ti·td) with D, ti without. */
  readonly trackingTimeS?: number;
}

/** Robustness figures of the loop L = Cy·G·F. Definitions in lib/control/margins. */
export interface Margins {
  readonly gainMargin: number;
  readonly gainMarginDb: number;
  readonly gainMarginLow: number;
  readonly phaseCrossover: number | null;
  readonly phaseCrossoverLow: number | null;
  readonly phaseMarginDeg: number | null;
  readonly gainCrossover: number | null;
  readonly delayMarginS: number | null;
  readonly delayMarginFrequency: number | null;
  readonly ms: number | null;
  readonly msFrequency: number | null;
  readonly mt: number | null;
  readonly mtFrequency: number | null;
}

export const DEFAULT_DERIVATIVE_FILTER = 10;

/** Fills in the defaults of the ideal form: no integral, no derivative, n = 10, b = 1, c = 0. */
export function idealController(given: Partial<IdealController> & { kp: number }): IdealController {
  return { ti: Infinity, td: 0, n: DEFAULT_DERIVATIVE_FILTER, b: 1, c: 0, ...given };
}
