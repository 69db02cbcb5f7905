import { ok, refuse } from '../../result';
import { multiply } from '../polynomial';
import { placeOf, type PlainText } from './characters';
import { readSingle } from './numbers';
import type { RawPlant, TextResult } from './types';

type Name = 'k' | 'kv' | 'tau1' | 'tau2' | 'tau3' | 'theta' | 'wn' | 'zeta' | 'tz';

const NAMES: readonly (readonly [Name, RegExp])[] = [
  ['k', /^(k|gain|ks|kp)$/i],
  ['kv', /^(kv|ki|k')$/i],
  ['tau1', /^(tau_?1?|τ_?1?|t_?1?|lag_?1?)$/i],
  ['tau2', /^(tau_?2|τ_?2|t_?2|lag_?2)$/i],
  ['tau3', /^(tau_?3|τ_?3|t_?3|lag_?3)$/i],
  ['theta', /^(theta|θ|ϑ|l|delay|dead_?time|td)$/i],
  ['wn', /^(wn|w_n|ωn|ω_n|omega_?n|w0|ω0|omega_?0)$/i],
  ['zeta', /^(zeta|ζ|ξ|xi)$/i],
  ['tz', /^(tz|t_z|tauz|tau_z|τz)$/i],
];

const PAIR =
  /([\p{L}_][\p{L}\d_']*)\s*[=:]\s*([+-]?(?:\d+(?:[.,]\d+)?|[.,]\d+)(?:e[+-]?\d+)?)\s*(?:(?:rad\/s|s|sec)(?![\p{L}\d_]))?/giu;

export function nameOf(word: string): Name | null {
  return NAMES.find(([, pattern]) => pattern.test(word))?.[0] ?? null;
}

/** Whether a text is a run of `name = number` and nothing else. */
export function looksLikeParameters(text: string): boolean {
  const rest = text.replace(PAIR, '');
  return rest.length < text.length && /^[\s,;]*$/.test(rest);
}

type Values = Partial<Record<Name, number>>;

/** Builds the plant that the named values stand for. */
export function plantOfParameters(values: Values): TextResult<RawPlant> {
  const { k, kv, tau1, tau2, tau3, theta = 0, wn, zeta, tz } = values;
  if (k === undefined && kv === undefined)
    return refuse('SYNTAX', 'The gain is missing: state K, or Kv for an integrating plant.');
  if (k !== undefined && kv !== undefined) return refuse('AMBIGUOUS', 'State K or Kv, not both.');
  if ((wn === undefined) !== (zeta === undefined))
    return refuse(
      'SYNTAX',
      'Natural frequency wn and damping ratio zeta go together; one of them is missing.',
    );
  const lags = [tau1, tau2, tau3].filter((tau) => tau !== undefined);
  if (wn !== undefined && lags.length > 0)
    return refuse('AMBIGUOUS', 'State time constants, or natural frequency and damping, not both.');
  const named: [string, number | undefined][] = [
    ['A time constant', Math.min(...lags, Infinity)],
    ['The natural frequency', wn],
  ];
  for (const [words, value] of named)
    if (value !== undefined && value <= 0) return refuse('SYNTAX', `${words} must be above 0, not ${value}.`);
  let den = kv === undefined ? [1] : [1, 0];
  for (const tau of lags) den = multiply(den, [tau, 1]);
  let num = [k ?? kv ?? 0];
  if (wn !== undefined && zeta !== undefined) {
    den = multiply(den, [1, 2 * zeta * wn, wn * wn]);
    num = [num[0] * wn * wn];
  }
  if (tz !== undefined) num = multiply(num, [tz, 1]);
  return ok({ num, den, deadTimeS: theta });
}

/** Named parameters: `K=2 tau=10 theta=3`, `K=1.25 wn=44 zeta=1.35`, `Kv=0.2 theta=1`. */
export function readParameters(source: PlainText): TextResult<RawPlant> {
  const values: Values = {};
  for (const match of source.text.matchAll(PAIR)) {
    const [, word, number] = match;
    const name = nameOf(word);
    const at = placeOf(source, match.index);
    if (!name)
      return refuse(
        'UNKNOWN_SYMBOL',
        `“${word.slice(0, 30)}” is not known here. Use K or Kv, tau, tau1, tau2, wn, zeta, tz, theta.`,
        at,
      );
    if (values[name] !== undefined) return refuse('AMBIGUOUS', `“${word}” is stated twice.`, at);
    const read = readSingle(number, at);
    if (!read.ok) return read;
    values[name] = read.value;
  }
  return plantOfParameters(values);
}
