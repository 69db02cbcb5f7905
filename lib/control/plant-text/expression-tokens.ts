import { ok, refuse } from '../../result';
import { placeOf, TextWriter, type PlainText } from './characters';
import type { TextResult } from './types';

const NUMBER = /(?:\d+\.?\d*|\.\d+)(?:e[+-]?\d+)?/iuy;
const WORD = /[\p{L}_][\p{L}\d_]*/uy;
const OPERATORS = '+-*/^()';

function unknownWord(word: string, at: number): TextResult<never> {
  const shown = word.slice(0, 30);
  const hints: readonly (readonly [RegExp, string])[] = [
    [/^e$/, 'Write a dead time as e^(-3 s).'],
    [/^S$/, 'Write the variable as a small s.'],
    [/^s\d+$/, `Write a power as s^${shown.slice(1)}.`],
    [/^[ij]$/, 'Complex numbers can’t stand in an expression; multiply the pair out.'],
    [/./, 'Numbers and s alone may stand in an expression; named values are written K=2 tau=10 theta=3.'],
  ];
  const hint = hints.find(([pattern]) => pattern.test(word))?.[1] ?? '';
  return refuse('UNKNOWN_SYMBOL', `“${shown}” is not known here. ${hint}`, at);
}

/** An expression ready for the parser, with the places of its numbers and symbols in their order. */
export interface Tokens extends PlainText {
  readonly leaves: readonly number[];
  readonly warnings: readonly string[];
}

/** 2e-3s may be meant for 2 e^(-3s): the number touches s. */
function likeDeadTime(number: string, next: string | undefined): string[] {
  const [factor, exponent] = number.split(/e(?=-)/i);
  if (exponent === undefined || next !== 's') return [];
  return [`“${number}” is read as a number. Write ${factor} e^(${exponent} s) for a dead time.`];
}

type Kind = 'number' | 'operand' | 'open' | 'close' | 'operator' | 'function' | 'start';

/** Refuses a number that touches what stands before it, which the parser would take as a product. */
function touchingNumber(before: Kind, number: string, at: number): TextResult<null> {
  if (before === 'number')
    return refuse(
      'SYNTAX',
      'Two numbers follow each other. Write an operator between them, or two lists: [2] / [10 1].',
      at,
    );
  if (before === 'operand' || before === 'close')
    return refuse(
      'AMBIGUOUS',
      `The ${number.slice(0, 30)} behind ${before === 'close' ? 'the bracket' : 's'} can be a power or a factor. Write ^${number.slice(0, 30)} or *${number.slice(0, 30)}.`,
      at,
    );
  return ok(null);
}

function kindOfOperator(operator: string): Kind {
  if (operator === '(') return 'open';
  return operator === ')' ? 'close' : 'operator';
}

/**
 * Looks at every sign of an expression before the parser does: only numbers, s, pi, e^, exp( and + − · / ^ with
 * brackets pass. Puts s and pi in brackets, since the parser would take s(s+1) for a function of the name s.
 */
export function tokenised(source: PlainText): TextResult<Tokens> {
  const { text } = source;
  const writer = new TextWriter();
  const leaves: number[] = [];
  const warnings: string[] = [];
  let before: Kind = 'start';
  let newLine = false;
  for (let from = 0; from < text.length;) {
    const at = placeOf(source, from);
    const blank = /\s/.test(text[from]);
    if (blank) {
      newLine ||= text[from] === '\n';
      writer.write(' ', at);
      from += 1;
      continue;
    }
    NUMBER.lastIndex = from;
    WORD.lastIndex = from;
    const number = NUMBER.exec(text)?.[0];
    const word = WORD.exec(text)?.[0];
    const begins = number !== undefined || word !== undefined || text[from] === '(';
    if (begins && newLine && (before === 'number' || before === 'operand' || before === 'close'))
      return refuse(
        'SYNTAX',
        'Two lines without an operator between them. Write a fraction as (2)/(10s+1).',
        at,
      );
    newLine = false;
    if (number !== undefined) {
      const touching = touchingNumber(before, number, at);
      if (!touching.ok) return touching;
      leaves.push(at);
      warnings.push(...likeDeadTime(number, text[from + number.length]));
      // Without its bare point, which the parser would take for the beginning of another operator: 10.*s.
      const digits = number.replace(/\.$/, '');
      for (let i = 0; i < digits.length; i += 1) writer.write(digits[i], placeOf(source, from + i));
      before = 'number';
      from += number.length;
    } else if (word !== undefined) {
      const next = text.slice(from + word.length).trimStart()[0];
      const exponential = (word === 'e' && next === '^') || (word === 'exp' && next === '(');
      if (word === 'exp' && !exponential)
        return refuse('SYNTAX', 'exp needs its argument in brackets: exp(-3 s).', at);
      if (!exponential && word !== 's' && word !== 'pi' && word !== 'π') return unknownWord(word, at);
      if (word !== 'exp') leaves.push(at);
      writer.write(exponential ? word : word === 's' ? '(s)' : '(pi)', at);
      before = exponential ? 'function' : 'operand';
      from += word.length;
    } else if (OPERATORS.includes(text[from])) {
      if (text.startsWith('--', from))
        return refuse('SYNTAX', 'Two minus signs follow each other. Write one, or - (-2).', at);
      writer.write(text[from], at);
      before = kindOfOperator(text[from]);
      from += 1;
    } else {
      const strange = String.fromCodePoint(text.codePointAt(from) ?? 0);
      const hint =
        strange === ',' ? 'Write decimals with a point.' : 'Use numbers, s, + − · / ^ and brackets.';
      return refuse('SYNTAX', `“${strange}” can’t stand in an expression in s. ${hint}`, at);
    }
  }
  return ok({ ...writer.finish(), leaves, warnings });
}
