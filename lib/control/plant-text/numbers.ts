import { ok, refuse } from '../../result';
import type { TextResult } from './types';

const NUMBER = /^[+-]?(\d+\.?\d*|\.\d+)(e[+-]?\d+)?$/i;

function readNumber(token: string, at: number): TextResult<number> {
  if (!NUMBER.test(token)) return refuse('SYNTAX', `“${token.slice(0, 30)}” is not a number.`, at);
  const value = Number(token);
  return Number.isFinite(value)
    ? ok(value)
    : refuse('NOT_FINITE', `${token.slice(0, 30)} is too large to compute with.`, at);
}

/** How commas are meant in a text: between numbers, or as the decimal mark. */
export type CommaMeaning = 'separator' | 'decimal' | 'either';

/**
 * What the commas of coefficient lists mean, judged over all of the lists: with a point anywhere, or a blank after one,
 * or two in one number, they part numbers; with semicolons or blanks between the numbers they are decimal marks.
 */
export function commaMeaning(lists: readonly string[]): CommaMeaning {
  const all = lists.join('\n');
  if (!all.includes(',')) return 'separator';
  if (all.includes('.') || /,\s/.test(all) || /\s,/.test(all)) return 'separator';
  const tokens = all.split(/[;\s]+/).filter(Boolean);
  if (tokens.some((token) => (token.match(/,/g)?.length ?? 0) > 1)) return 'separator';
  const parted = lists.some((list) => /[;\s]/.test(list.trim()));
  return parted ? 'decimal' : 'either';
}

/** Reads a list of numbers parted by commas, semicolons, blanks or tabs. `offset` is its place in the whole text. */
export function readList(list: string, commas: CommaMeaning, offset: number): TextResult<number[]> {
  const separators = commas === 'separator' ? /[,;\s]+/ : /[;\s]+/;
  const values: number[] = [];
  let place = 0;
  for (const token of list.split(separators).filter(Boolean)) {
    place = list.indexOf(token, place);
    if (commas === 'either' && token.includes(','))
      return refuse(
        'AMBIGUOUS',
        `“${token}” can be one number or two. Write ${token.replace(',', ' ')} for two, ${token.replace(',', '.')} for one.`,
        offset + place,
      );
    const read = readNumber(commas === 'decimal' ? token.replace(',', '.') : token, offset + place);
    if (!read.ok) return read;
    values.push(read.value);
    place += token.length;
  }
  return values.length > 0 ? ok(values) : refuse('EMPTY', 'A list of coefficients is empty.', offset);
}

/** One number of a text in which a comma can only be a decimal mark. */
export function readSingle(token: string, at: number): TextResult<number> {
  return readNumber(token.includes('.') ? token : token.replace(',', '.'), at);
}
