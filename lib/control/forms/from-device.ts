import type { IdealController } from '../types';
import { parameterUnits, type ParameterUnits } from './look-up';
import type { ControllerRest } from './parallel';
import { settingOf } from './resolution';
import { controllerOf, impossible } from './terms';
import { offCodeOf } from './to-device';
import type { Conversion, Convention, DeviceName } from './types';

/** Numbers as they stand in the device; a missing i or d is a term that the device does not have. */
export type DeviceNumbers = Readonly<Partial<Record<DeviceName, number>>>;

/**
 * The controller that a device's numbers stand for: the way back of toDevice, and the reading of as-found values.
 *
 * @param values the device's numbers by name, as entered (rounded, scaled)
 * @param convention of the device
 * @param rest what the numbers do not carry: filter ratio (default 10), set-point weights (b 1, c 0), measurement filter
 * @returns the ideal controller; or MISSING_VALUE without p, IMPOSSIBLE_VALUE (0 gain or time, mixed signs),
 *   NO_IDEAL_FORM, SPAN_NEEDED, COUNTS_NEEDED, SAMPLE_TIME_NEEDED
 */
export function fromDevice(
  values: DeviceNumbers,
  convention: Convention,
  rest: ControllerRest = {},
): Conversion<IdealController> {
  const units = parameterUnits(convention);
  if (!units.ok) return units;
  if (values.p === undefined) {
    return {
      ok: false,
      code: 'MISSING_VALUE',
      message: `The value of P (${units.value.gain.label}) is missing.`,
    };
  }
  const p = unscaled(values.p, 'p', convention);
  if (p === 0 || !Number.isFinite(p))
    return impossible('p', `${units.value.gain.label} must be a number other than 0`);
  if (p < 0 && convention.action !== undefined) {
    return impossible('p', 'with the action set separately the gain is above 0');
  }
  const i = termOf('i', values.i, convention, units.value);
  if (i === 0) {
    return impossible(
      'i',
      'an integral time of 0 would act infinitely strongly; if 0 means off here, the convention must say so',
    );
  }
  const d = termOf('d', values.d, convention, units.value);
  const f = values.f === undefined ? null : unscaled(values.f, 'f', convention);
  return controllerOf({ p, i, d, f }, convention, units.value, rest);
}

/** The number without the device's scale, or null for a term that is off. */
function termOf(
  name: 'i' | 'd',
  stored: number | undefined,
  convention: Convention,
  units: ParameterUnits,
): number | null {
  if (stored === undefined || stored === offCodeOf(name, convention, units)) return null;
  const isTime = name === 'i' && units.integral.isTime === true;
  if (isTime ? Math.abs(stored) === Infinity : stored === 0) return null;
  return unscaled(stored, name, convention);
}

function unscaled(stored: number, name: DeviceName, convention: Convention): number {
  return stored / (settingOf(convention.scale, name) ?? 1);
}
