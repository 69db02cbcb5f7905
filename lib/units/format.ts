import { roundSignificant } from './round';

export interface NumberFormat {
  /** Significant digits, 1 to 17; trailing zeros are dropped. Default 4. */
  readonly significant?: number;
  /** Fixed decimals, 0 to 20, trailing zeros kept as a device shows them; wins over `significant`. */
  readonly decimals?: number;
}

const MINUS = '−';
const NOT_DEFINED = '–';
const SUPERSCRIPTS = '⁰¹²³⁴⁵⁶⁷⁸⁹';
/** Powers of ten within which a number is written out. */
const PLAIN_FROM = -5;
const PLAIN_BELOW = 7;

/**
 * Writes a number for a reader: leading zero, decimal point, a true minus sign, no thousands separators;
 * powers of ten only below 10⁻⁵ and from 10⁷ on: 1.2·10⁻⁷.
 *
 * @param value a number; Infinity (or "inf") gives '∞', null and NaN give '–' (not defined)
 * @param format significant digits (default 4, trailing zeros dropped) or fixed decimals
 */
export function formatNumber(value: number | 'inf' | null, format: NumberFormat = {}): string {
  if (value === null || Number.isNaN(value)) return NOT_DEFINED;
  if (value === 'inf' || value === Infinity) return '∞';
  if (value === -Infinity) return `${MINUS}∞`;
  const text =
    format.decimals === undefined
      ? significantText(value, format.significant ?? 4)
      : fixedText(value, format.decimals);
  return text.replace('-', MINUS);
}

function fixedText(value: number, decimals: number): string {
  if (Math.abs(value) >= 1e21) return significantText(value, 17);
  const text = value.toFixed(decimals);
  return Number(text) === 0 ? text.replace('-', '') : text;
}

function significantText(value: number, significant: number): string {
  const rounded = roundSignificant(value, significant);
  if (rounded === 0) return '0';
  const [mantissa, exponentText] = rounded.toExponential().split('e');
  const exponent = Number(exponentText);
  if (exponent >= PLAIN_BELOW || exponent < PLAIN_FROM) return `${mantissa}·10${superscript(exponent)}`;
  const decimals = Math.max(0, (mantissa.split('.')[1] ?? '').length - exponent);
  return rounded.toFixed(decimals);
}

function superscript(exponent: number): string {
  const digits = [...String(Math.abs(exponent))].map((digit) => SUPERSCRIPTS[Number(digit)]).join('');
  return exponent < 0 ? `⁻${digits}` : digits;
}

/**
 * A number with its unit, a normal space between them; angles in degrees stand without one: '45°', '30°/s', but '85 °C'.
 *
 * @param unit free text of the axis; empty for a plain ratio
 */
export function formatQuantity(
  value: number | 'inf' | null,
  unit: string,
  format: NumberFormat = {},
): string {
  const number = formatNumber(value, format);
  const name = unit.trim();
  if (name === '' || number === NOT_DEFINED) return number;
  const isAngle = /^°(?![CFKR])/.test(name);
  return isAngle ? `${number}${name}` : `${number} ${name}`;
}

const TIME_UNITS: readonly { readonly below: number; readonly seconds: number; readonly unit: string }[] = [
  { below: 1e-3, seconds: 1e-6, unit: 'µs' },
  { below: 1, seconds: 1e-3, unit: 'ms' },
  { below: 120, seconds: 1, unit: 's' },
  { below: 7200, seconds: 60, unit: 'min' },
  { below: Infinity, seconds: 3600, unit: 'h' },
];

/**
 * A time in the unit that a person would say: µs below 1 ms, ms below 1 s, s below 2 min, min below 2 h, then h;
 * three significant digits.
 *
 * @param seconds time in s; Infinity (or "inf") gives '∞ s', null gives '–'
 */
export function formatTimeS(seconds: number | 'inf' | null): string {
  if (seconds === null || seconds === 'inf' || !Number.isFinite(seconds) || seconds === 0) {
    return formatQuantity(seconds, 's');
  }
  const rounded = Math.abs(roundSignificant(seconds, 3));
  const scale = TIME_UNITS.find(({ below }) => rounded < below) ?? TIME_UNITS[TIME_UNITS.length - 1];
  return formatQuantity(seconds / scale.seconds, scale.unit, { significant: 3 });
}
