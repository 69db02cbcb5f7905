import { ok, refuse, type Result } from '../result';

export interface ParseNumberOptions {
  /** Accept 'inf', 'infinity' and '∞'. Default: refused. */
  readonly allowInfinity?: boolean;
  /** What 'off' stands for. Without it 'off' is refused. */
  readonly offValue?: number;
  /** The unit expected: another one behind (or before) the number is refused. Without it any unit is dropped. */
  readonly unit?: string;
}

export type ParseNumberCode = 'EMPTY' | 'NOT_A_NUMBER' | 'AMBIGUOUS' | 'INFINITE' | 'OFF' | 'UNIT_MISMATCH';

const SUPERSCRIPTS = '⁰¹²³⁴⁵⁶⁷⁸⁹';
/** Sign, digits with their separators (a blank before '1/s' is none), power of ten. */
const NUMBER =
  /^([+-]?)\s*((?:\d(?:[\d.,']| (?!1\/))*)?[.,]?\d+[.,]?|\d+)(?:\s*[·×*]\s*10\^?([+-]?\d+)|[eE]([+-]?\d+))?/;
/** What may stand before the number: a name such as 'Kp =', or a unit, set off by a blank or a sign. */
const LEADING = /^[\p{L}°%µΩ][^\d+\-.,∞]*?[\s=:]+(?=[+\-.,\d∞])/u;
/** What may stand behind it. Digits only as exponents ('m/s2'), so that a letter typed for a digit is found out. */
const UNIT = /^(?![eE][+-]?$)(?:1\/)?[\p{L}°%µΩ"'′″(](?:[^\d.,]|(?<=\p{L}\^?-?)[123](?!\p{L}|\d))*$/u;

/**
 * Reads a number as people type it: decimal point or comma, any minus sign, powers of ten as 1e-3 or 1.2·10⁻⁷, a unit
 * before or behind it. Texts that could carry a thousands separator are refused rather than guessed.
 *
 * @param text what was typed
 * @param options infinity, 'off' and the expected unit
 * @returns the number, or EMPTY, NOT_A_NUMBER, AMBIGUOUS (1,234), INFINITE, OFF, UNIT_MISMATCH with what would be right
 */
export function parseNumber(text: string, options: ParseNumberOptions = {}): Result<number, ParseNumberCode> {
  const given = plain(text);
  if (given === '') return refuse('EMPTY', 'Enter a number, for example 0.25.');
  const word = readWord(given, options);
  if (word) return word;

  const body = given.replace(LEADING, '');
  const match = NUMBER.exec(body);
  if (!match) return refuse('NOT_A_NUMBER', `"${text.trim()}" is not a number; write it like 0.25 or 1e-3.`);
  const behind = body.slice(match[0].length).trim();
  const before = given.slice(0, given.length - body.length).trim();
  if (behind !== '' && !UNIT.test(behind)) {
    return refuse(
      'NOT_A_NUMBER',
      `"${text.trim()}" goes on after the number with "${behind}"; enter one number and its unit.`,
    );
  }
  const wrongUnit = unitMismatch(behind, before, options.unit);
  if (wrongUnit !== null) return wrongUnit;

  const mantissa = readMantissa(match[2].trim());
  if (!mantissa.ok) return mantissa;
  const exponent = match[3] ?? match[4] ?? '0';
  const value = Number(`${match[1]}${mantissa.value}e${exponent}`);
  if (!Number.isFinite(value))
    return refuse('NOT_A_NUMBER', `"${text.trim()}" is too large to calculate with.`);
  return ok(value === 0 ? 0 : value);
}

/** One kind of minus, blank and exponent digit. */
function plain(text: string): string {
  return text
    .replace(/[−–‒﹣-]/g, '-')
    .replace(/[\u00a0\u2007\u2009\u202f]/g, ' ')
    .replace(/10([⁺⁻]?[⁰¹²³⁴⁵⁶⁷⁸⁹]+)/g, (_, digits: string) => `10^${digits.replace(/./g, fromSuperscript)}`)
    .trim();
}

function fromSuperscript(character: string): string {
  if (character === '⁻') return '-';
  if (character === '⁺') return '+';
  return String(SUPERSCRIPTS.indexOf(character));
}

function readWord(given: string, options: ParseNumberOptions): Result<number, ParseNumberCode> | null {
  const word = given.toLowerCase();
  const infinite = /^([+-]?)\s*(?:∞|inf(?:inity|inite)?)(?!\p{L})/u.exec(word);
  if (infinite) {
    if (!options.allowInfinity) return refuse('INFINITE', 'A finite number is needed here.');
    return ok(infinite[1] === '-' ? -Infinity : Infinity);
  }
  if (word !== 'off') return null;
  if (options.offValue === undefined)
    return refuse('OFF', 'This value cannot be switched off; enter a number.');
  return ok(options.offValue);
}

function unitMismatch(
  behind: string,
  before: string,
  unit: string | undefined,
): { ok: false; code: 'UNIT_MISMATCH'; message: string } | null {
  if (unit === undefined || behind === '') return null;
  const squeezed = (name: string) => name.replace(/\s+/g, '').replace(/μ/g, 'µ');
  if (squeezed(behind) === squeezed(plain(unit))) return null;
  const expected = unit === '' ? 'a number without a unit' : `a value in ${unit}`;
  return refuse(
    'UNIT_MISMATCH',
    `"${[before, behind].filter(Boolean).join(' ')}" is another unit; enter ${expected}.`,
  );
}

/** Digits with at most one decimal mark; anything that may be a thousands separator is refused. */
function readMantissa(digits: string): Result<string, 'AMBIGUOUS' | 'NOT_A_NUMBER'> {
  const marks = digits.match(/[.,' ]/g) ?? [];
  if (marks.length > 1 || marks[0] === ' ' || marks[0] === "'") {
    return refuse(
      'AMBIGUOUS',
      `"${digits}" holds more than one separator; enter it without thousands separators.`,
    );
  }
  // A point is always the decimal mark here. A comma before exactly three digits is a decimal mark for some and a
  // thousands separator for others, except behind a lone zero.
  if (/^[1-9]\d{0,2},\d{3}$/.test(digits)) {
    const [whole, rest] = digits.split(',');
    return refuse(
      'AMBIGUOUS',
      `"${digits}" can be read in two ways; enter ${whole}.${rest} or ${whole}${rest}.`,
    );
  }
  return ok(digits.replace(',', '.'));
}
