import { ok, refuse } from '../../result';
import { multiply } from '../polynomial';
import { placeOf, type PlainText } from './characters';
import { eitherComma, readDecimal, type CommaMeaning } from './numbers';
import type { TextResult } from './types';

/** A zero or pole, with its place in the text if it has one. */
export interface Root {
  readonly re: number;
  readonly im: number;
  readonly at?: number;
}

function rootPattern(commas: CommaMeaning): RegExp {
  const mark = commas === 'separator' ? '\\.' : '[.,]';
  const number = `(?:\\d+(?:${mark}\\d*)?|${mark}\\d+)(?:e[+-]?\\d+)?`;
  const imaginary = `(${number})?[ij](${number})?`;
  // A sign with blanks on both sides, or on neither, goes on with the number; `-2 -3` are two.
  return new RegExp(
    `(?:([+-]?${number})(?![.,\\d]*[ij]))?(?:(\\s*±\\s*|\\s+[+-]\\s+|[+-])?${imaginary}(?![\\p{L}\\d]))?`,
    'iuy',
  );
}

function readPair(match: RegExpExecArray, at: number): TextResult<Root[]> {
  const [text, real, sign, before, behind] = match;
  const re = real === undefined ? ok(0) : readDecimal(real, at);
  if (!re.ok) return re;
  if (!/[ij]/i.test(text)) return ok([{ re: re.value, im: 0, at }]);
  if (before !== undefined && behind !== undefined)
    return refuse('SYNTAX', `“${text.slice(0, 30)}” is not a complex number. Write it as -3+4i.`, at);
  const size = readDecimal(before ?? behind ?? '1', at);
  if (!size.ok) return size;
  const above = { re: re.value, im: size.value, at };
  const below = { re: re.value, im: -size.value, at };
  if (size.value === 0) return ok([above]);
  if (sign?.includes('±')) return ok([above, below]);
  return ok([sign?.includes('-') ? below : above]);
}

/** Real and complex numbers parted by blanks, commas or semicolons: `-2, -3±4i`, `-3+4i -3-4i`; or `none`. */
export function readRoots(list: PlainText, commas: CommaMeaning): TextResult<Root[]> {
  const text = list.text.replace(/^(\s*)[[(]([^[\]()]*)[\])](\s*)$/, '$1 $2 $3');
  if (/^\s*(none|-)?\s*$/i.test(text)) return ok([]);
  const pattern = rootPattern(commas);
  const roots: Root[] = [];
  let from = text.search(/\S/);
  while (from < text.length) {
    pattern.lastIndex = from;
    const match = pattern.exec(text);
    const at = placeOf(list, from);
    const ends = match !== null && /^([,;\s]|$)/.test(text.slice(from + match[0].length));
    if (!match || match[0] === '' || !ends)
      return refuse(
        'SYNTAX',
        `“${text.slice(from, from + 20).split(/[;\s]/)[0]}” is not a real or complex number. Write -3 or -3±4i.`,
        at,
      );
    if (commas === 'either' && match[0].includes(',')) return eitherComma(match[0], at);
    const read = readPair(match, at);
    if (!read.ok) return read;
    roots.push(...read.value);
    from += match[0].length;
    from += /^\s*[,;]?\s*/.exec(text.slice(from))?.[0].length ?? 0;
  }
  return ok(roots);
}

function wordsOf({ re, im }: Root): string {
  return `${re === 0 ? '' : re}${im < 0 ? '-' : re === 0 ? '' : '+'}${Math.abs(im)}i`;
}

/** The monic polynomial with these roots; complex ones must come in conjugate pairs. */
export function monic(roots: readonly Root[]): TextResult<number[]> {
  const left = [...roots];
  let polynomial = [1];
  for (let root = left.shift(); root !== undefined; root = left.shift()) {
    const { re, im, at } = root;
    if (im === 0) {
      polynomial = multiply(polynomial, [1, -re]);
      continue;
    }
    const partner = left.findIndex((other) => other.re === re && other.im === -im);
    if (partner < 0)
      return refuse(
        'NOT_RATIONAL',
        `${wordsOf(root)} has no partner ${wordsOf({ re, im: -im })}, so that coefficients would be complex. Write ${re === 0 ? '' : re}±${Math.abs(im)}i for both.`,
        at,
      );
    left.splice(partner, 1);
    polynomial = multiply(polynomial, [1, -2 * re, re * re + im * im]);
  }
  return ok(polynomial);
}
