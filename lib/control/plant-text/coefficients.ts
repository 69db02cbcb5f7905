import { ok, refuse } from '../../result';
import { placeOf, sliceOf, type PlainText } from './characters';
import { commaMeaning, readList, readTimeS, type CommaMeaning } from './numbers';
import { sectionFor, sectionsOf } from './sections';
import type { RawPlant, TextResult } from './types';

const LABEL =
  /(?<![\p{L}\d])((?:num|numerator|den|denominator|delay|dead[\s_-]?time|theta|θ)(?![\p{L}\d])|[bnad](?=\s*[:=]))\s*[:=]?/giu;
const RATIO = /^\s*\[([^[\]]*)\]\s*[/,;]?\s*\[([^[\]]*)\]\s*$/;
const NUMBERS_ONLY = /^[\s.,;eE+-]*\d[\s\d.,;eE+-]*$/;
const ONE_LIST = /^\s*\[[^[\]]*\]\s*$/;
const SEVERAL_NUMBERS = /[\d.]\s*[,;\s]\s*[+-]?[\d.]/;

type Kind = 'num' | 'den' | 'delay';

function kindOf(word: string): Kind {
  const first = word.toLowerCase();
  if (/^(num|n$|b$)/.test(first)) return 'num';
  return /^(den|d$|a$)/.test(first) ? 'den' : 'delay';
}

/** A list without the one pair of brackets around it, if there is one. */
function unbracketed(list: PlainText): PlainText {
  return { ...list, text: list.text.replace(/^(\s*)[[(]([^[\]()]*)[\])](\s*)$/, '$1 $2 $3') };
}

/** `num: 2 / den: 10 1` */
function withoutSlash(list: PlainText): PlainText {
  return sliceOf(list, 0, list.text.replace(/\s*\/$/, '').length);
}

/** Cuts a text without labels into its two lists; null when it isn't two lists. */
function twoLists(source: PlainText): [PlainText, PlainText] | null {
  const { text } = source;
  const ratio = RATIO.exec(text);
  if (ratio) {
    const open = text.indexOf('[') + 1;
    const second = text.indexOf('[', open) + 1;
    return [sliceOf(source, open, open + ratio[1].length), sliceOf(source, second, second + ratio[2].length)];
  }
  const cut = /^[^/]*\/[^/]*$/.test(text) ? text.indexOf('/') : lineBreak(text);
  if (cut < 0) return null;
  const halves: [PlainText, PlainText] = [
    unbracketed(sliceOf(source, 0, cut)),
    unbracketed(sliceOf(source, cut + 1)),
  ];
  const lists = halves.every((half) => NUMBERS_ONLY.test(half.text));
  const aFraction = text[cut] === '/' && !halves.some((half) => SEVERAL_NUMBERS.test(half.text.trim()));
  return lists && !aFraction ? halves : null;
}

/** The line break of a text of two lines; -1 when there are more or fewer. */
function lineBreak(text: string): number {
  return /^\s*\S[^\n]*\n\s*\S[^\n]*\s*$/.test(text) ? text.indexOf('\n', text.search(/\S/)) : -1;
}

/**
 * [2]/[10,1] could be 2/10.1, but that would be no plant with a motion of its own: brackets around single words with
 * commas are lists of numbers parted by commas.
 */
function inBrackets(num: PlainText, den: PlainText): boolean {
  return [num, den].every(({ text }) => !/[;\s]/.test(text.trim()));
}

/** How the commas were taken, where only the look of the lists tells. */
function commaNote(lists: readonly PlainText[], commas: CommaMeaning): string[] {
  const [word] = lists.map(({ text }) => /[^;\s]*\d,\d[^;\s]*/.exec(text)?.[0]).filter(Boolean);
  if (word === undefined) return [];
  if (commas === 'either')
    return [`“${word}” is read as two numbers. Write ${word.replace(',', '.')} for one.`];
  if (commas !== 'decimal' || lists.some(({ text }) => /[;\t\n]/.test(text))) return [];
  return [
    `“${word}” is read as ${word.replace(',', '.')}, with a decimal comma. Write blanks for two numbers.`,
  ];
}

function readLists(num: PlainText, den: PlainText, bracketed = false): TextResult<RawPlant> {
  const meaning = commaMeaning([num.text, den.text]);
  const commas = meaning === 'either' && bracketed && inBrackets(num, den) ? 'separator' : meaning;
  const warnings = commaNote([num, den], commas === meaning ? commas : 'either');
  const top = readList(num, commas);
  if (!top.ok) return top;
  const bottom = readList(den, commas);
  if (!bottom.ok) return bottom;
  const places = {
    num: placeOf(num, num.text.search(/\S/)),
    den: placeOf(den, den.text.search(/\S/)),
  };
  return ok({ num: top.value, den: bottom.value, deadTimeS: 0, places, warnings });
}

/** One list is no plant; the more so when it can't be told what it holds. */
function oneList(source: PlainText): TextResult<RawPlant> {
  const list = unbracketed(source);
  const read = readList(list, commaMeaning([list.text]));
  if (!read.ok) return read;
  return refuse(
    'SYNTAX',
    'The denominator is missing. Write both lists: [2] / [10 1].',
    placeOf(source, source.text.trimEnd().length),
  );
}

/** Whether a text labels a numerator or a denominator. */
export function looksLabelled(text: string): boolean {
  return (
    [...text.matchAll(LABEL)].some(({ 1: word }) => /^(num|den)/i.test(word)) ||
    /^\s*[bn]\s*[:=][^]*\b[ad]\s*[:=]/i.test(text)
  );
}

/** `num: 2420; den: 1 118.8 1936; delay: 3`, in any order. */
export function readLabelled(source: PlainText): TextResult<RawPlant> {
  const cut = sectionsOf(source, LABEL, kindOf, 'num:, den: and delay:');
  if (!cut.ok) return cut;
  const num = sectionFor(cut.value, 'num');
  const den = sectionFor(cut.value, 'den');
  if (!num || !den)
    return refuse('SYNTAX', `The ${num ? 'denominator' : 'numerator'} is missing. Write num: 2  den: 10 1.`);
  const empty = [num, den].find(({ part }) => part.text.trim() === '');
  if (empty)
    return refuse(
      'EMPTY',
      `There are no numbers behind “${empty.label}”. Write num: 2  den: 10 1.`,
      empty.labelPlace,
    );
  const lists = readLists(unbracketed(withoutSlash(num.part)), unbracketed(den.part));
  const delay = sectionFor(cut.value, 'delay');
  if (!lists.ok || !delay) return lists;
  const deadTimeS = readTimeS(delay.part);
  if (!deadTimeS.ok) return deadTimeS;
  const places = { ...lists.value.places, deadTime: delay.labelPlace };
  return ok({ ...lists.value, deadTimeS: deadTimeS.value, places });
}

/** `[2420] / [1 118.8 1936]` or two lines, in descending powers of s; null when the text is no such thing. */
export function readCoefficients(source: PlainText): TextResult<RawPlant> | null {
  const lists = twoLists(source);
  if (lists) return readLists(...lists, RATIO.test(source.text));
  return ONE_LIST.test(source.text) ? oneList(source) : null;
}
