import type { DeviceRow } from '../../control/forms';
import type { Values } from '../../../db/schema';
import { FettleError, type FieldError } from '../../errors';
import { formatNumber } from '../../units';

/** Share by which a device may round an entered value and still hold what was meant. */
const ROUNDING = 0.005;

export function sameValue(value: number, expected: number): boolean {
  return value === expected || Math.abs(value - expected) <= ROUNDING * Math.abs(expected);
}

/** Every parameter of the device must be there, and nothing else. */
export function requireEveryValue(
  values: Values,
  rows: readonly DeviceRow[],
  field: string,
  words: string,
): void {
  const known = new Set<string>(rows.map(({ name }) => name));
  const errors: FieldError[] = [
    ...rows
      .filter(({ name }) => values[name] === undefined)
      .map(({ name, label }) => ({ path: `${field}.${name}`, message: `${label} ${words} is missing.` })),
    ...Object.keys(values)
      .filter((name) => !known.has(name))
      .map((name) => ({ path: `${field}.${name}`, message: `This device has no parameter “${name}”.` })),
  ];
  if (errors.length > 0) throw new FettleError('INVALID', errors[0].message, { fields: errors });
}

/** The parameters whose value is not the expected one, in words. */
export function differences(values: Values, rows: readonly DeviceRow[], field: string): FieldError[] {
  return rows
    .filter(({ name, value }) => !sameValue(values[name], value))
    .map(({ name, label, unit, text }) => ({
      path: `${field}.${name}`,
      message: `${label}: ${formatNumber(values[name], { significant: 7 })}${unit ? ` ${unit}` : ''} instead of ${text}.`,
    }));
}
