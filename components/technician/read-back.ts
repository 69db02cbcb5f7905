import { explainMixUp } from '@/lib/control/forms';
import { formatNumber, parseNumber } from '@/lib/units';
import type { SheetRow } from './types';

export type ReadBack =
  | { kind: 'empty' }
  | { kind: 'unreadable'; message: string }
  | { kind: 'same'; value: number }
  | { kind: 'rounded'; value: number; message: string }
  | { kind: 'different'; value: number; message: string };

/** Share by which a device may round what is entered and still hold the value that was meant. */
const ROUNDING = 0.005;

/**
 * Compares a typed value with the one expected: the same, the same within the device's rounding, or different —
 * and then, where it is a known mix-up of units or rows, which one.
 */
export function readBack(
  text: string,
  expected: number | null,
  row: SheetRow,
  others: Readonly<Record<string, number>>,
): ReadBack {
  if (text.trim() === '') return { kind: 'empty' };
  const parsed = parseNumber(text, { unit: row.unit });
  if (!parsed.ok) return { kind: 'unreadable', message: parsed.message };
  const value = parsed.value;
  if (expected === null) return { kind: 'same', value };
  if (value === expected) return { kind: 'same', value };
  const off = Math.abs(value - expected) / Math.max(Math.abs(expected), Number.MIN_VALUE);
  const shown = `${formatNumber(value, { significant: 7 })}${row.unit ? ` ${row.unit}` : ''}`;
  if (off <= ROUNDING)
    return { kind: 'rounded', value, message: `${shown}: the same within the device’s rounding.` };
  const mixUp = explainMixUp(value, expected, { others });
  return {
    kind: 'different',
    value,
    message: mixUp ? `${shown} is not what is expected. ${mixUp}` : `${shown} is not what is expected.`,
  };
}
