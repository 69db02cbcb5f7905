import { ok, refuse } from '../../result';
import { plantOfRoots, type Complex } from './gain-zeros-poles';
import { nameOf, plantOfParameters } from './parameters';
import type { RawPlant, TextResult } from './types';

type Fields = Readonly<Record<string, unknown>>;

function isNumberList(value: unknown): value is number[] {
  return Array.isArray(value) && value.length > 0 && value.every((item) => typeof item === 'number');
}

function delayOf(fields: Fields): TextResult<number> {
  const given = fields.delay ?? fields.deadTime ?? fields.deadTimeS ?? fields.theta ?? 0;
  return typeof given === 'number' ? ok(given) : refuse('SYNTAX', 'The delay must be a number of seconds.');
}

function rootsOf(value: unknown): Complex[] | null {
  if (value === undefined) return [];
  if (!Array.isArray(value)) return null;
  const roots = value.map((item: unknown): Complex | null => {
    if (typeof item === 'number') return { re: item, im: 0 };
    if (typeof item !== 'object' || item === null) return null;
    const { re, im } = item as Partial<Complex>;
    return typeof re === 'number' && typeof im === 'number' ? { re, im } : null;
  });
  return roots.every((root) => root !== null) ? (roots as Complex[]) : null;
}

/** JSON: {num, den, delay}, {gain, zeros, poles, delay}, or named parameters. */
export function readJsonPlant(text: string): TextResult<RawPlant> {
  let parsed: unknown;
  try {
    parsed = JSON.parse(text);
  } catch {
    return refuse('SYNTAX', 'This is not valid JSON. Write {"num": [2], "den": [10, 1], "delay": 3}.');
  }
  if (typeof parsed !== 'object' || parsed === null || Array.isArray(parsed))
    return refuse('SYNTAX', 'The JSON must be an object such as {"num": [2], "den": [10, 1]}.');
  const fields = parsed as Fields;
  const delay = delayOf(fields);
  if (!delay.ok) return delay;
  if ('num' in fields || 'den' in fields) {
    const { num, den } = fields;
    if (!isNumberList(num) || !isNumberList(den))
      return refuse('SYNTAX', 'num and den must be lists of numbers.');
    return ok({ num, den, deadTimeS: delay.value });
  }
  if ('poles' in fields) {
    const zeros = rootsOf(fields.zeros);
    const poles = rootsOf(fields.poles);
    const gain = fields.gain ?? 1;
    if (!zeros || !poles || typeof gain !== 'number')
      return refuse('SYNTAX', 'zeros and poles must be lists of numbers or {re, im}, gain a number.');
    return plantOfRoots(gain, zeros, poles, delay.value);
  }
  const values: Record<string, number> = {};
  for (const [key, value] of Object.entries(fields)) {
    const name = nameOf(key);
    if (!name) return refuse('UNKNOWN_SYMBOL', `“${key.slice(0, 30)}” is not known here.`);
    if (typeof value !== 'number') return refuse('SYNTAX', `“${key}” must be a number.`);
    values[name] = value;
  }
  return plantOfParameters(values);
}
