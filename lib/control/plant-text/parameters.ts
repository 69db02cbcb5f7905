import { ok, refuse } from '../../result';
import { multiply } from '../polynomial';
import { placeOf, type PlainText } from './characters';
import { readSingle, readTimeS } from './numbers';
import { sectionsOf } from './sections';
import type { RawPlant, TextResult } from './types';

export type ParameterName = 'k' | 'kv' | 'tau1' | 'tau2' | 'tau3' | 'theta' | 'wn' | 'zeta' | 'tz';
export type ParameterValues = Partial<Record<ParameterName, number>>;

/** Kp, Ti, Td and the like are left out: they name settings of a controller. */
const NAMES: readonly (readonly [ParameterName, RegExp])[] = [
  ['k', /^(k|ks|gain)$/i],
  ['kv', /^(kv|k')$/i],
  ['tau1', /^(tau_?1?|τ_?1?|t_?1?|lag_?1?)$/i],
  ['tau2', /^(tau_?2|τ_?2|t_?2|lag_?2)$/i],
  ['tau3', /^(tau_?3|τ_?3|t_?3|lag_?3)$/i],
  ['theta', /^(theta|θ|ϑ|l|delay|dead_?time(_?s)?)$/i],
  ['wn', /^(wn|w_n|ωn|ω_n|omega_?n|w0|ω0|omega_?0)$/i],
  ['zeta', /^(zeta|ζ|ξ|xi)$/i],
  ['tz', /^(tz|t_z|tauz|tau_z|τz|τ_z)$/i],
];

export const KNOWN_NAMES = 'K or Kv, tau, tau1, tau2, tau3, wn and zeta, tz, theta';
const LABEL = /(?<![\p{L}\d_])([\p{L}][\p{L}\d_']*|dead[ -]time)\s*[=:]/giu;
const IS_TIME: ReadonlySet<ParameterName> = new Set(['tau1', 'tau2', 'tau3', 'theta', 'tz']);

export function parameterName(word: string): ParameterName | undefined {
  return NAMES.find(([, pattern]) => pattern.test(word.replace(/[ -]/, '')))?.[0];
}

/** Names that a transfer function goes by: G, Gp, H, g. */
const TRANSFER_FUNCTION = /^([FGHPW]\w{0,2}|[gh])$/;

/** Whether a text is a run of `name = number`; `K = 2/(s+1)` and `G = …` are expressions. */
export function looksLikeParameters(text: string): boolean {
  const labels = [...text.matchAll(LABEL)];
  if (labels.length === 0 || text.slice(0, labels[0].index).trim() !== '') return false;
  if (labels.length > 1) return true;
  const [{ index, 0: label, 1: word }] = labels;
  const name = parameterName(word);
  // Tu=3 is no plant of gain 3: a single number belongs to a name, and the name has to be known.
  const isNumber = /^\s*[+-]?[\d.,]+(?:e[+-]?\d+)?\s*$/i.test(text.slice(index + label.length));
  if (name === undefined) return isNumber && !TRANSFER_FUNCTION.test(word);
  return name === 'k' || name === 'kv' ? !/[(^*/]|\d\s*s\b/.test(text) : true;
}

function contradiction({ k, kv, tau1, tau2, tau3, wn, zeta }: ParameterValues): TextResult<null> {
  if (k === undefined && kv === undefined)
    return refuse('SYNTAX', 'The gain is missing: state K, or Kv for an integrating plant.');
  if (k !== undefined && kv !== undefined)
    return refuse('AMBIGUOUS', 'K and Kv are both stated. State K, or Kv for an integrating plant.');
  if ((wn === undefined) !== (zeta === undefined))
    return refuse(
      'SYNTAX',
      'Natural frequency wn and damping ratio zeta go together; one of them is missing.',
    );
  const lags = [tau1, tau2, tau3].filter((tau) => tau !== undefined);
  if (wn !== undefined && lags.length > 0)
    return refuse('AMBIGUOUS', 'State time constants, or natural frequency and damping, not both.');
  const lag = lags.find((tau) => tau <= 0);
  if (lag !== undefined)
    return refuse(
      'SYNTAX',
      `A time constant must be above 0, not ${lag}. Write an unstable plant as an expression: 2/(10s-1).`,
    );
  if (wn !== undefined && wn <= 0)
    return refuse('SYNTAX', `The natural frequency must be above 0, not ${wn}.`);
  return ok(null);
}

/**
 * The plant that named values stand for: K·(tz s + 1)/((tau1 s + 1)…)·e^(-theta s), K·wn²/(s² + 2 zeta wn s + wn²),
 * and with Kv in place of K the same with a pole at the origin.
 */
export function plantOfParameters(values: ParameterValues): TextResult<RawPlant> {
  const possible = contradiction(values);
  if (!possible.ok) return possible;
  const { k, kv, tau1, tau2, tau3, theta = 0, wn, zeta, tz } = values;
  let den = kv === undefined ? [1] : [1, 0];
  for (const tau of [tau1, tau2, tau3]) if (tau !== undefined) den = multiply(den, [tau, 1]);
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
  const cut = sectionsOf(source, LABEL, parameterName, KNOWN_NAMES);
  if (!cut.ok) return cut;
  const values: ParameterValues = {};
  let deadTime: number | undefined;
  for (const { kind, label, labelPlace, part } of cut.value) {
    if (part.text.trim() === '') return refuse('SYNTAX', `The number of “${label}” is missing.`, labelPlace);
    const number = kind === 'wn' ? { ...part, text: part.text.replace(/\s*rad\/s\s*$/i, '') } : part;
    const read = IS_TIME.has(kind) ? readTimeS(number) : readSingle(number);
    if (!read.ok) return read;
    values[kind] = read.value;
    if (kind === 'theta') deadTime = labelPlace;
  }
  const plant = plantOfParameters(values);
  return plant.ok ? ok({ ...plant.value, places: { num: placeOf(source, 0), deadTime } }) : plant;
}
