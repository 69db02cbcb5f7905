import { MISSING, type Ground, type Need } from './ground';
import {
  DERIVATIVE_UNITS,
  FILTER_UNITS,
  GAIN_UNITS,
  INTEGRAL_UNITS,
  type DerivativeUnitRow,
  type FilterUnitRow,
  type GainUnitRow,
  type IntegralUnitRow,
  type ParameterUnit,
} from './parameter-units';
import type { Conversion, Convention } from './types';

/** The rows of the tables that a convention uses, and the ground that they stand on. */
export interface ParameterUnits {
  readonly gain: GainUnitRow;
  readonly integral: IntegralUnitRow;
  readonly derivative: DerivativeUnitRow;
  readonly filter: FilterUnitRow | null;
  readonly ground: Ground;
}

/** Looks the units of a convention up and refuses when a span, count or sample time that they need is not stated. */
export function parameterUnits(convention: Convention): Conversion<ParameterUnits> {
  const gain = GAIN_UNITS[convention.gain];
  const integral = INTEGRAL_UNITS[convention.integral];
  const derivative = DERIVATIVE_UNITS[convention.derivative];
  const filter = convention.filter === undefined ? null : FILTER_UNITS[convention.filter];
  const used: readonly ParameterUnit[] = [gain, integral, derivative, ...(filter ? [filter] : [])];
  for (const unit of used) {
    for (const need of unit.needs ?? []) {
      const given = convention[need];
      if (given !== undefined && Number.isFinite(given) && given > 0) continue;
      const { code, what } = MISSING[need];
      return { ok: false, code, message: `${unit.label} in this unit needs ${what}, above 0.` };
    }
  }
  const known = (need: Need) => convention[need] ?? NaN;
  const ground: Ground = {
    sampleTimeS: known('sampleTimeS'),
    inputSpan: known('inputSpan'),
    outputSpan: known('outputSpan'),
    inputCounts: known('inputCounts'),
    outputCounts: known('outputCounts'),
    hasSpans: known('inputSpan') > 0 && known('outputSpan') > 0,
  };
  return { ok: true, value: { gain, integral, derivative, filter, ground } };
}
