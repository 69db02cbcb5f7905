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

/** Factors between the units that get mixed up: minutes, hours, milliseconds and their inverses. */
const UNIT_FACTORS = [60, 1 / 60, 3600, 1 / 3600, 1000, 1 / 1000];

/** A person types "0.33" for a third of a minute: the exact mix-up that rounds to what was typed, or the value itself. */
function meant(value: number, expected: number, text: string): number {
  const decimals = /[.,](\d+)/.exec(text)?.[1].length ?? 0;
  const candidate = UNIT_FACTORS.map((factor) => expected * factor).find(
    (mixed) =>
      value !== 0 &&
      Math.abs(mixed - value) <= 0.5 * 10 ** -decimals &&
      Math.abs(mixed - value) < 0.1 * Math.abs(value),
  );
  return candidate ?? value;
}

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
  const mixUp = explainMixUp(meant(value, expected, text), expected, { others });
  return {
    kind: 'different',
    value,
    message: mixUp ? `${shown} is not what is expected. ${mixUp}` : `${shown} is not what is expected.`,
  };
}
