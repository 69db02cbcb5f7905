import { ok, refuse } from '../../result';
import { placeOf, type PlainText } from './characters';
import type { TextResult } from './types';

const NUMBER = /^[+-]?(\d+(\.\d*)?|\.\d+)(e[+-]?\d+)?$/i;
/** Also how thousands are parted, so that 1,500 may be 1.5 or 1500. */
const THOUSANDS = /^[+-]?[1-9]\d{0,2},\d{3}$/;
const TIME = /^(.*?)\s*(s|sec|ms|us|μs|min|h)?$/su;
const IN_SECONDS: Readonly<Record<string, (value: number) => number>> = {
  ms: (value) => value / 1e3,
  us: (value) => value / 1e6,
  μs: (value) => value / 1e6,
  min: (value) => value * 60,
  h: (value) => value * 3600,
};

/** What commas mean in a text: they part numbers, are decimal marks, or it can't be told. */
export type CommaMeaning = 'separator' | 'decimal' | 'either';

function readNumber(token: string, at: number): TextResult<number> {
  if (!NUMBER.test(token))
    return refuse('SYNTAX', `“${token.slice(0, 30)}” is not a number. Write it as 2.5 or 1.2e-3.`, at);
  const value = Number(token);
  return Number.isFinite(value)
    ? ok(value)
    : refuse('NOT_FINITE', `${token.slice(0, 30)} is too large to compute with.`, at);
}

/** One number whose comma, if it has one, is a decimal mark. */
export function readDecimal(token: string, at: number): TextResult<number> {
  if (THOUSANDS.test(token))
    return refuse(
      'AMBIGUOUS',
      `“${token}” can be ${token.replace(',', '.')} or ${token.replace(',', '')}. Write the one that is meant.`,
      at,
    );
  return readNumber(token.includes('.') ? token : token.replace(',', '.'), at);
}

/** The number that a part of a text holds and nothing else. */
export function readSingle(part: PlainText): TextResult<number> {
  return readDecimal(part.text.trim(), placeOf(part, part.text.search(/\S|$/)));
}

/** A time in seconds, with s, ms, us, min or h behind it if need be. */
export function readTimeS(part: PlainText): TextResult<number> {
  const [, number = '', unit = 's'] = TIME.exec(part.text.trim()) ?? [];
  const read = readDecimal(number, placeOf(part, part.text.search(/\S|$/)));
  return read.ok ? ok(IN_SECONDS[unit]?.(read.value) ?? read.value) : read;
}

/**
 * What the commas of coefficient lists mean, judged over all of the lists of a text. A point anywhere, a blank at a
 * comma, a sign behind one, or two of them in a row of digits: they part numbers. Blanks or semicolons beside commas
 * between digits: they are decimal marks. Signs of both, or of neither: it can't be told.
 */
export function commaMeaning(lists: readonly string[]): CommaMeaning {
  const all = lists.join('\n');
  if (!all.includes(',')) return 'separator';
  // [1,5; 2.5] mixes a comma between digits with another separator.
  const mixed = lists.some((list) => /\d,\d/.test(list) && /[^,;\s](?:\s*;\s*|\s+)[^,;\s]/.test(list));
  if (all.includes('.')) return mixed ? 'either' : 'separator';
  const parts = /,\s|\s,|,[+-]|,,|\d,\d+,\d/.test(all);
  const marks = lists.some(
    (list) => /\d,\d/.test(list) && (/[;\s]/.test(list.trim()) || /\d,0\d/.test(list)),
  );
  if (parts === marks) return 'either';
  return parts ? 'separator' : 'decimal';
}

/** “1,5” can be one number or two: says how to write either. */
export function eitherComma(token: string, at: number): TextResult<never> {
  return refuse(
    'AMBIGUOUS',
    `“${token.slice(0, 30)}” can be one number with a decimal comma or two numbers. Write ${token.slice(0, 30).replace(',', '.')} for one, ${token.slice(0, 30).replaceAll(',', ' ')} for two.`,
    at,
  );
}

/** Reads a list of numbers parted by commas, semicolons, blanks or tabs. */
export function readList(list: PlainText, commas: CommaMeaning): TextResult<number[]> {
  const tokens = commas === 'separator' ? /[^,;\s]+|[,;]/g : /[^;\s]+|;/g;
  const doubtful = commas === 'either' ? /[^,;\s]*\d,\d[^,;\s]*/.exec(list.text) : null;
  if (doubtful) return eitherComma(doubtful[0], placeOf(list, doubtful.index));
  const values: number[] = [];
  let expected = true;
  for (const { 0: token, index } of list.text.matchAll(tokens)) {
    const at = placeOf(list, index);
    if (token === ',' || token === ';') {
      if (expected) return refuse('SYNTAX', `A number is missing before this “${token}”.`, at);
      expected = true;
      continue;
    }
    const read = readDecimal(token, at);
    if (!read.ok) return read;
    values.push(read.value);
    expected = false;
  }
  const last = list.text.trimEnd();
  if (values.length > 0 && last.endsWith(','))
    return refuse('SYNTAX', 'A number is missing after this “,”.', placeOf(list, last.length - 1));
  return values.length > 0
    ? ok(values)
    : refuse('EMPTY', 'A list of coefficients is empty. Write 1 for the constant one.', placeOf(list, 0));
}
