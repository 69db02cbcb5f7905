import { ok, refuse } from '../../result';
import { multiply } from '../polynomial';
import { placeOf, type PlainText } from './characters';
import { readSingle } from './numbers';
import type { RawPlant, TextResult } from './types';

const LABEL = /\b(gain|k|zeros?|z|poles?|p|delay|dead[\s_-]?time|theta|θ)\s*[:=]?\s*(?=[[\s\d+.-]|none|$)/giu;
const COMPLEX =
  /^([+-]?(?:\d+\.?\d*|\.\d+)(?:e[+-]?\d+)?)?(?:(±|[+-])?((?:\d+\.?\d*|\.\d+)(?:e[+-]?\d+)?)?[ij])?$/i;

type Kind = 'gain' | 'zeros' | 'poles' | 'delay';

export interface Complex {
  readonly re: number;
  readonly im: number;
}

function kindOf(label: string): Kind {
  const word = label.toLowerCase();
  if (word.startsWith('z')) return 'zeros';
  if (word.startsWith('p')) return 'poles';
  return word === 'gain' || word === 'k' ? 'gain' : 'delay';
}

/** Whether the text states poles by that name. */
export function looksLikeGainZerosPoles(text: string): boolean {
  return /(^|[\s;,])(poles?\b|p\s*[:=]\s*\[)/i.test(text);
}

function readRoot(token: string, at: number): TextResult<Complex[]> {
  const match = COMPLEX.exec(token);
  if (!match || token === '')
    return refuse('SYNTAX', `“${token.slice(0, 30)}” is not a real or complex number.`, at);
  const imaginary = /[ij]$/i.test(token);
  const re = match[1] === undefined ? 0 : Number(match[1]);
  if (!imaginary) return ok([{ re, im: 0 }]);
  const size = match[3] === undefined ? 1 : Number(match[3]);
  if (match[2] === '±')
    return ok([
      { re, im: size },
      { re, im: -size },
    ]);
  return ok([{ re, im: match[2] === '-' ? -size : size }]);
}

function readRoots(text: string, at: number): TextResult<Complex[]> {
  const inside = text.replace(/[[\]()]/g, ' ').replace(/\s*(±)\s*/g, '$1');
  if (/^\s*(none)?[\s,;]*$/i.test(inside)) return ok([]);
  const roots: Complex[] = [];
  for (const token of inside.split(/[,;\s]+/).filter(Boolean)) {
    const read = readRoot(token, at);
    if (!read.ok) return read;
    roots.push(...read.value);
  }
  return ok(roots);
}

/** The monic polynomial with these roots; complex ones must come in conjugate pairs. */
export function monic(roots: readonly Complex[]): number[] | null {
  const left = [...roots];
  let polynomial = [1];
  while (left.length > 0) {
    const { re, im } = left.pop() as Complex;
    if (im === 0) {
      polynomial = multiply(polynomial, [1, -re]);
      continue;
    }
    const partner = left.findIndex((other) => other.re === re && other.im === -im);
    if (partner < 0) return null;
    left.splice(partner, 1);
    polynomial = multiply(polynomial, [1, -2 * re, re * re + im * im]);
  }
  return polynomial;
}

/** The plant gain·Π(s − z)/Π(s − p)·e^(-θ s); the gain is the factor before the monic ratio, not the steady gain. */
export function plantOfRoots(
  gain: number,
  zeros: readonly Complex[],
  poles: readonly Complex[],
  deadTimeS: number,
): TextResult<RawPlant> {
  const num = monic(zeros);
  const den = monic(poles);
  if (!num || !den)
    return refuse('SYNTAX', 'Complex zeros and poles must come in pairs a ± bi; one has no partner.');
  return ok({ num: num.map((c) => c * gain), den, deadTimeS });
}

/** `gain 2; zeros -1; poles -2 -3±4i; delay 0.5`. */
export function readGainZerosPoles(source: PlainText): TextResult<RawPlant> {
  const labels = [...source.text.matchAll(LABEL)];
  const parts: Partial<Record<Kind, { text: string; at: number }>> = {};
  for (const [index, match] of labels.entries()) {
    const kind = kindOf(match[1]);
    const from = match.index + match[0].length;
    const at = placeOf(source, match.index);
    if (parts[kind]) return refuse('AMBIGUOUS', `“${match[1]}” is stated twice.`, at);
    parts[kind] = { text: source.text.slice(from, labels[index + 1]?.index), at };
  }
  if (!parts.poles) return refuse('SYNTAX', 'The poles are missing.');
  const zeros = readRoots(parts.zeros?.text ?? '', parts.zeros?.at ?? 0);
  const poles = readRoots(parts.poles.text, parts.poles.at);
  const single = (part: { text: string; at: number } | undefined, missing: number) =>
    part ? readSingle(part.text.replace(/[[\],;\s]/g, '').replace(/s$/, ''), part.at) : ok(missing);
  const gain = single(parts.gain, 1);
  const delay = single(parts.delay, 0);
  if (!zeros.ok) return zeros;
  if (!poles.ok) return poles;
  if (!gain.ok) return gain;
  return delay.ok ? plantOfRoots(gain.value, zeros.value, poles.value, delay.value) : delay;
}
