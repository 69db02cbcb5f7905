import { ok, refuse } from '../../result';
import { placeOf, type PlainText } from './characters';
import { commaMeaning, readList, readSingle } from './numbers';
import type { RawPlant, TextResult } from './types';

const DELAY =
  /[,;\s]*\b(?:delay|dead[\s_-]?time|theta|θ)\s*[:=]?\s*([+-]?[\d.,]+(?:e[+-]?\d+)?)\s*(?:s(?:ec)?\b)?\s*$/iu;
const LABELLED =
  /^\s*(?:num|numerator|n|b)\s*[:=]\s*([\s\S]*?)[,;\s/]*\b(?:den|denominator|d|a)\s*[:=]\s*([\s\S]*)$/i;
const RATIO = /^\s*\[([^[\]]*)\]\s*[/,;]?\s*\[([^[\]]*)\]\s*$/;
const NUMBERS_ONLY = /^[\s\d.,;eE+-]+$/;

interface Part {
  readonly text: string;
  readonly at: number;
}

/** Cuts the text into its two lists; null when it isn't two lists at all. */
function twoLists(text: string): [Part, Part] | null {
  const labelled = LABELLED.exec(text);
  if (labelled) return [bare(text, labelled[1], 0), bare(text, labelled[2], labelled[1].length)];
  const ratio = RATIO.exec(text);
  if (ratio) {
    const first = text.indexOf('[') + 1;
    return [
      { text: ratio[1], at: first },
      { text: ratio[2], at: text.indexOf('[', first) + 1 },
    ];
  }
  const lines = text.split('\n').filter((line) => line.trim() !== '');
  if (lines.length === 2 && lines.every((line) => NUMBERS_ONLY.test(bareList(line))))
    return [bare(text, lines[0], 0), bare(text, lines[1], text.indexOf(lines[0]) + lines[0].length)];
  const halves = text.split('/');
  const longEnough = halves.some((half) => /[\d.]\s*[,;\s]\s*[+-]?[\d.]/.test(half.trim()));
  if (
    halves.length === 2 &&
    longEnough &&
    halves.every((half) => NUMBERS_ONLY.test(bareList(half)) && half.trim() !== '')
  )
    return [bare(text, halves[0], 0), bare(text, halves[1], halves[0].length + 1)];
  return null;
}

function bareList(list: string): string {
  return list.replace(/[[\]()]/g, ' ');
}

function bare(text: string, part: string, after: number): Part {
  return { text: bareList(part), at: Math.max(0, text.indexOf(part, after)) };
}

/** Two coefficient lists in descending powers, and a dead time after them if there is one; null when it is no such text. */
export function readCoefficients(source: PlainText): TextResult<RawPlant> | null {
  const delay = DELAY.exec(source.text);
  const body = delay ? source.text.slice(0, delay.index) : source.text;
  const lists = twoLists(body);
  if (!lists) return null;
  const commas = commaMeaning(lists.map(({ text }) => text));
  const read = lists.map(({ text, at }) => readList(text, commas, at));
  for (const list of read) {
    if (list.ok) continue;
    return refuse(list.code, list.message, list.at === undefined ? undefined : placeOf(source, list.at));
  }
  const [num, den] = read.map((list) => (list.ok ? list.value : []));
  const deadTime = delay ? readSingle(delay[1], delay.index) : ok(0);
  return deadTime.ok ? ok({ num, den, deadTimeS: deadTime.value }) : deadTime;
}
