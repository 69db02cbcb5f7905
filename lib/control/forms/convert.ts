import type { IdealController } from '../types';
import { fromDevice, type DeviceNumbers } from './from-device';
import { toDevice } from './to-device';
import type { AxisUnits, Conversion, Convention, DeviceName, DeviceRow } from './types';

export interface DeviceConversion {
  readonly values: readonly DeviceRow[];
  /** What the rounded numbers stand for; null when they are no controller any more (a gain rounded to 0). */
  readonly readBack: IdealController | null;
  readonly rounding: {
    readonly relative: Readonly<Partial<Record<DeviceName, number>>>;
    /** The largest in size, signed. */
    readonly largest: number;
  };
  readonly warnings: readonly string[];
}

/**
 * Converts a controller for a device and reads the rounded numbers back, so that the check can be run on what will
 * really stand in the device.
 *
 * @param controller ideal form
 * @param convention of the device
 * @param axis units of the axis
 * @returns as toDevice refuses; otherwise the rows, the controller read back, the relative rounding and warnings
 */
export function convert(
  controller: IdealController,
  convention: Convention,
  axis?: AxisUnits,
): Conversion<DeviceConversion> {
  const device = toDevice(controller, convention, axis);
  if (!device.ok) return device;
  const { rows, warnings } = device.value;
  const readBack = fromDevice(numbersOf(rows), convention, controller);
  const relative = Object.fromEntries(rows.map((row) => [row.name, row.relativeRounding]));
  const largest = rows.reduce(
    (most, row) => (Math.abs(row.relativeRounding) > Math.abs(most) ? row.relativeRounding : most),
    0,
  );
  return {
    ok: true,
    value: {
      values: rows,
      readBack: readBack.ok ? readBack.value : null,
      rounding: { relative, largest },
      warnings: readBack.ok ? warnings : [...warnings, `Read back: ${readBack.message}`],
    },
  };
}

/** The numbers of a device by name, as fromDevice takes them. */
export function numbersOf(rows: readonly DeviceRow[]): DeviceNumbers {
  return Object.fromEntries(rows.map((row) => [row.name, row.value]));
}
