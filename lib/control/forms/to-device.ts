import { formatNumber, formatQuantity, formatTimeS } from '../../units';
import type { IdealController } from '../types';
import { parameterUnits, type ParameterUnits } from './look-up';
import { atResolution, settingOf } from './resolution';
import { exactValues, type ExactValues } from './terms';
import type { AxisUnits, Conversion, Convention, DeviceName, DeviceRow, DeviceValues } from './types';
import { UNNAMED_UNITS, unitTexts } from './unit-text';

/** Rounding beyond this share of a value is named in a warning. */
const NOTABLE_ROUNDING = 0.01;

/**
 * The parameters of a controller as a device wants them: form, unit, scale and resolution of its convention.
 *
 * In the ideal and series forms a time or repeat rate stands for itself and a gain (also per sample) is the P gain over
 * the integral time, or times the derivative time. In the parallel form every parameter is independent of the P gain:
 * its integral time is ti/kp, its derivative time kp·td. With both spans given, gains are in % per %.
 *
 * @param controller ideal form, kp ≠ 0, times in s
 * @param convention of the device
 * @param axis units of the measurement and the output, free text
 * @returns rows in the order P, I, D, filter; or NO_SERIES_FORM (with the closest controller that has one),
 *   SPAN_NEEDED, COUNTS_NEEDED, SAMPLE_TIME_NEEDED, WRONG_ACTION, ZERO_GAIN
 */
export function toDevice(
  controller: IdealController,
  convention: Convention,
  axis: AxisUnits = UNNAMED_UNITS,
): Conversion<DeviceValues> {
  const units = parameterUnits(convention);
  if (!units.ok) return units;
  const refusal = unusableGain(controller, convention);
  if (refusal) return refusal;
  const exact = exactValues(controller, convention, units.value);
  if (!exact.ok) return exact;
  const rows = deviceRows(exact.value, convention, units.value, axis);
  return { ok: true, value: { rows, warnings: warningsOf(rows, controller, convention) } };
}

function unusableGain(controller: IdealController, convention: Convention): Conversion<never> | null {
  const { kp } = controller;
  if (kp === 0 || !Number.isFinite(kp)) {
    return {
      ok: false,
      code: 'ZERO_GAIN',
      message: `A gain of ${formatNumber(kp)} is no controller; it must be a number other than 0.`,
    };
  }
  const fitting = kp > 0 ? 'reverse' : 'direct';
  if (convention.action === undefined || convention.action === fitting) return null;
  const message =
    `A gain of ${formatNumber(kp)} needs ${fitting} action (measurement up, output ${kp > 0 ? 'down' : 'up'}), ` +
    `but the device is set to ${convention.action} action. The loop would drive itself to the end stop.`;
  return { ok: false, code: 'WRONG_ACTION', message };
}

function deviceRows(
  exact: ExactValues,
  convention: Convention,
  units: ParameterUnits,
  axis: AxisUnits,
): DeviceRow[] {
  const texts = unitTexts(units, convention, axis);
  const tables = { p: units.gain, i: units.integral, d: units.derivative, f: units.filter };
  const names: readonly DeviceName[] = ['p', 'i', 'd', 'f'];
  return names.flatMap((name): DeviceRow[] => {
    const table = tables[name];
    if (table === null || (name === 'f' && exact.f === null)) return [];
    const unit = scaledUnit(texts[name], name, convention);
    const about = { name, label: table.label, unit, direction: table.direction };
    const offCode = offCodeOf(name, convention, units);
    const off =
      offCode === undefined ? {} : { off: `off: enter ${formatNumber(offCode, { significant: 15 })}` };
    const exactValue = exact[name];
    if (exactValue === null) return [{ ...about, ...off, ...offNumber(offCode), isOff: true }];
    const stored = exactValue * (settingOf(convention.scale, name) ?? 1);
    const { value, text } = atResolution(stored, name, convention);
    return [
      {
        ...about,
        ...off,
        value,
        exact: stored,
        text,
        isOff: false,
        roundsToOff: value === 0 || value === offCode,
        outsideLimits: isOutside(value, name, convention),
        relativeRounding: Number.isFinite(stored) && stored !== 0 ? (value - stored) / stored : 0,
      },
    ];
  });
}

/** A term that is off: its off code, or ∞ for an integral time without one. */
function offNumber(offCode: number | undefined) {
  const value = offCode ?? Infinity;
  const text = formatNumber(value, { significant: 15 });
  return { value, exact: value, text, roundsToOff: false, outsideLimits: false, relativeRounding: 0 };
}

/** What switches a term off: the device's own code, or 0 where 0 means no action in its unit. */
export function offCodeOf(
  name: DeviceName,
  convention: Convention,
  units: ParameterUnits,
): number | undefined {
  if (name === 'i') return convention.offCodes?.i ?? (units.integral.isTime ? undefined : 0);
  if (name === 'd') return convention.offCodes?.d ?? 0;
  return undefined;
}

function scaledUnit(unit: string, name: DeviceName, convention: Convention): string {
  const scale = settingOf(convention.scale, name) ?? 1;
  if (scale === 1) return unit;
  return `counts (${formatNumber(scale, { significant: 15 })} = ${formatQuantity(1, unit)})`;
}

function isOutside(value: number, name: DeviceName, convention: Convention): boolean {
  const { low = -Infinity, high = Infinity } = convention.limits?.[name] ?? {};
  return value < low || value > high;
}

function warningsOf(
  rows: readonly DeviceRow[],
  controller: IdealController,
  convention: Convention,
): string[] {
  const warnings = rows.flatMap((row) => {
    if (row.isOff && row.off === undefined) {
      return [
        `${row.label}: the integral is off, but the convention does not say what the device takes for off.`,
      ];
    }
    if (row.roundsToOff)
      return [`${row.label} comes out as ${row.text}, which is no action at all or the code for off.`];
    if (row.outsideLimits)
      return [`${row.label} of ${formatQuantity(row.value, row.unit)} is outside the range of the device.`];
    if (Math.abs(row.relativeRounding) < NOTABLE_ROUNDING) return [];
    const share = formatQuantity(100 * row.relativeRounding, '%', { significant: 3 });
    return [`${row.label} is rounded by ${share} to the resolution of the device.`];
  });
  if (controller.kp < 0 && convention.action === undefined) {
    warnings.push('The gain is negative: the loop needs direct action (measurement up, output up).');
  }
  if (controller.td > 0 && Number.isFinite(controller.n) && convention.filter === undefined) {
    const tf = formatTimeS(controller.td / controller.n);
    warnings.push(
      `The derivative filter (N = ${formatNumber(controller.n)}, ${tf}) has no parameter here: the device's own filter acts.`,
    );
  }
  return warnings;
}
