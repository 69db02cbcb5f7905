import type { Ground, Need } from './ground';
import type { DerivativeUnit, Direction, FilterUnit, GainUnit, IntegralUnit } from './types';

export interface ParameterUnit {
  readonly label: string;
  readonly direction: Direction;
  readonly needs?: readonly Need[];
}

export interface GainUnitRow extends ParameterUnit {
  /** Device's linear gain over kp; the integral and derivative gains are in it too. */
  readonly factor: (ground: Ground) => number;
  /** What a linear gain of 1 is divided into where the device states a band instead of a gain. */
  readonly band?: (ground: Ground) => number;
  readonly output: 'output' | '%' | '1' | 'counts';
  readonly input: 'input' | '%' | 'count';
}

const STRONGER: Direction = 'larger = stronger';
const WEAKER: Direction = 'larger = weaker';
const spanRatio = (ground: Ground) => (ground.hasSpans ? ground.inputSpan / ground.outputSpan : 1);

export const GAIN_UNITS: Readonly<Record<GainUnit, GainUnitRow>> = {
  gain: { label: 'P gain', direction: STRONGER, factor: spanRatio, output: 'output', input: 'input' },
  'proportional-band': {
    label: 'Proportional band',
    direction: WEAKER,
    needs: ['inputSpan', 'outputSpan'],
    factor: spanRatio,
    band: () => 100,
    output: '%',
    input: '%',
  },
  'throttling-range': {
    label: 'Proportional band',
    direction: WEAKER,
    needs: ['outputSpan'],
    factor: spanRatio,
    band: (ground) => ground.outputSpan * spanRatio(ground),
    output: 'output',
    input: 'input',
  },
  'percent-per-unit': {
    label: 'P gain',
    direction: STRONGER,
    needs: ['outputSpan'],
    factor: (ground) => 100 / ground.outputSpan,
    output: '%',
    input: 'input',
  },
  'fraction-per-unit': {
    label: 'P gain',
    direction: STRONGER,
    needs: ['outputSpan'],
    factor: (ground) => 1 / ground.outputSpan,
    output: '1',
    input: 'input',
  },
  counts: {
    label: 'P gain',
    direction: STRONGER,
    needs: ['inputSpan', 'outputSpan', 'inputCounts', 'outputCounts'],
    factor: (ground) => (spanRatio(ground) * ground.outputCounts) / ground.inputCounts,
    output: 'counts',
    input: 'count',
  },
};

/** Integral: strength is 1/ti, or gain/ti where `ofGain` (or the form is parallel), per second. */
export interface IntegralUnitRow extends ParameterUnit {
  readonly ofGain?: true;
  /** The value is factor/strength (a time) instead of factor·strength. */
  readonly isTime?: true;
  readonly factor: (ground: Ground) => number;
  readonly time: string;
}

const RESET = { label: 'Reset rate', direction: STRONGER } as const;
const I_TIME = { label: 'Integral time', direction: WEAKER, isTime: true } as const;
const I_GAIN = { label: 'I gain', direction: STRONGER, ofGain: true } as const;

export const INTEGRAL_UNITS: Readonly<Record<IntegralUnit, IntegralUnitRow>> = {
  seconds: { ...I_TIME, factor: () => 1, time: 's' },
  milliseconds: { ...I_TIME, factor: () => 1000, time: 'ms' },
  minutes: { ...I_TIME, factor: () => 1 / 60, time: 'min' },
  'repeats-per-second': { ...RESET, factor: () => 1, time: 's' },
  'repeats-per-minute': { ...RESET, factor: () => 60, time: 'min' },
  'repeats-per-hour': { ...RESET, factor: () => 3600, time: 'h' },
  gain: { ...I_GAIN, factor: () => 1, time: 's' },
  'gain-per-minute': { ...I_GAIN, factor: () => 60, time: 'min' },
  'per-sample': { ...I_GAIN, needs: ['sampleTimeS'], factor: (ground) => ground.sampleTimeS, time: 'sample' },
};

/** Derivative: lead is td, or gain·td where `ofGain` (or the form is parallel), in seconds; the value is factor·lead. */
export interface DerivativeUnitRow extends ParameterUnit {
  readonly ofGain?: true;
  readonly factor: (ground: Ground) => number;
  readonly time: string;
}

const D_TIME = { label: 'Derivative time', direction: STRONGER } as const;
const D_GAIN = { label: 'D gain', direction: STRONGER, ofGain: true } as const;

export const DERIVATIVE_UNITS: Readonly<Record<DerivativeUnit, DerivativeUnitRow>> = {
  seconds: { ...D_TIME, factor: () => 1, time: 's' },
  milliseconds: { ...D_TIME, factor: () => 1000, time: 'ms' },
  minutes: { ...D_TIME, factor: () => 1 / 60, time: 'min' },
  gain: { ...D_GAIN, factor: () => 1, time: 's' },
  'gain-minutes': { ...D_GAIN, factor: () => 1 / 60, time: 'min' },
  'per-sample': {
    ...D_GAIN,
    needs: ['sampleTimeS'],
    factor: (ground) => 1 / ground.sampleTimeS,
    time: 'sample',
  },
};

/** Derivative filter: from the filter time constant tf and the derivative time td of the form, and back to tf. */
export interface FilterUnitRow extends ParameterUnit {
  readonly value: (tf: number, td: number, ground: Ground) => number;
  readonly back: (value: number, td: number, ground: Ground) => number;
  readonly unit: string;
}

const F_TIME = { label: 'Derivative filter time', direction: WEAKER } as const;
const F_CUT = { label: 'Derivative cut-off', direction: STRONGER } as const;
const F_RATIO = 'Derivative filter ratio';

export const FILTER_UNITS: Readonly<Record<FilterUnit, FilterUnitRow>> = {
  ratio: {
    label: F_RATIO,
    direction: STRONGER,
    value: (tf, td) => td / tf,
    back: (value, td) => td / value,
    unit: 'ratio',
  },
  'inverse-ratio': {
    label: F_RATIO,
    direction: WEAKER,
    value: (tf, td) => tf / td,
    back: (value, td) => value * td,
    unit: 'ratio',
  },
  seconds: { ...F_TIME, value: (tf) => tf, back: (value) => value, unit: 's' },
  milliseconds: { ...F_TIME, value: (tf) => tf * 1000, back: (value) => value / 1000, unit: 'ms' },
  hertz: {
    ...F_CUT,
    value: (tf) => 1 / (2 * Math.PI * tf),
    back: (value) => 1 / (2 * Math.PI * value),
    unit: 'Hz',
  },
  'radians-per-second': { ...F_CUT, value: (tf) => 1 / tf, back: (value) => 1 / value, unit: 'rad/s' },
  'smoothing-factor': {
    label: 'Derivative smoothing factor',
    direction: STRONGER,
    needs: ['sampleTimeS'],
    value: (tf, _, ground) => ground.sampleTimeS / (tf + ground.sampleTimeS),
    back: (value, _, ground) => ground.sampleTimeS * (1 / value - 1),
    unit: 'share of the new value',
  },
};
