import { ok, refuse } from '../../result';
import { plain } from './characters';
import { readRoots, type Root } from './complex-roots';
import { plantOfRoots } from './gain-zeros-poles';
import { KNOWN_NAMES, parameterName, plantOfParameters, type ParameterValues } from './parameters';
import type { RawPlant, TextResult } from './types';

type Fields = Readonly<Record<string, unknown>>;

const DELAY_NAMES = ['delay', 'deadTime', 'deadTimeS', 'theta'];

function isNumberList(value: unknown): value is number[] {
  return Array.isArray(value) && value.length > 0 && value.every((item) => typeof item === 'number');
}

function delayOf(fields: Fields): TextResult<number> {
  const given = DELAY_NAMES.filter((name) => name in fields);
  if (given.length > 1)
    return refuse('AMBIGUOUS', `“${given[0]}” and “${given[1]}” both state the dead time. State it once.`);
  const value = given.length === 1 ? fields[given[0]] : 0;
  return typeof value === 'number'
    ? ok(value)
    : refuse('SYNTAX', `“${given[0]}” must be a number of seconds, such as 3.`);
}

/** A field that nobody knows may be a mistyped dead time: it is not passed over. */
function unknownField(fields: Fields, known: readonly string[]): TextResult<null> {
  const other = Object.keys(fields).find((name) => !known.includes(name) && !DELAY_NAMES.includes(name));
  return other === undefined
    ? ok(null)
    : refuse('UNKNOWN_SYMBOL', `“${other.slice(0, 30)}” is not known here. Use ${known.join(', ')}, delay.`);
}

function rootOf(item: unknown): TextResult<Root[]> {
  if (typeof item === 'number') return ok([{ re: item, im: 0 }]);
  if (typeof item === 'string') {
    const read = readRoots(plain(item), 'separator');
    return read.ok ? ok(read.value.map(({ re, im }) => ({ re, im }))) : refuse(read.code, read.message);
  }
  if (typeof item === 'object' && item !== null && 're' in item && 'im' in item) {
    const { re, im } = item;
    if (typeof re === 'number' && typeof im === 'number') return ok([{ re, im }]);
  }
  return refuse('SYNTAX', 'A zero or pole must be a number, {"re": -3, "im": 4}, or a text such as "-3±4i".');
}

function rootsOf(value: unknown, name: string): TextResult<Root[]> {
  if (value === undefined) return ok([]);
  if (!Array.isArray(value)) return refuse('SYNTAX', `“${name}” must be a list, such as [-2, -5].`);
  const roots: Root[] = [];
  for (const item of value) {
    const read = rootOf(item);
    if (!read.ok) return read;
    roots.push(...read.value);
  }
  return ok(roots);
}

function coefficientsOf(fields: Fields): TextResult<RawPlant> {
  const { num, den } = fields;
  if (!isNumberList(num) || !isNumberList(den))
    return refuse('SYNTAX', 'num and den must be lists of numbers: {"num": [2], "den": [10, 1]}.');
  const delay = delayOf(fields);
  return delay.ok ? ok({ num, den, deadTimeS: delay.value }) : delay;
}

function gainZerosPolesOf(fields: Fields): TextResult<RawPlant> {
  const gain = fields.gain ?? 1;
  if (typeof gain !== 'number') return refuse('SYNTAX', '“gain” must be a number.');
  const zeros = rootsOf(fields.zeros, 'zeros');
  if (!zeros.ok) return zeros;
  const poles = rootsOf(fields.poles, 'poles');
  if (!poles.ok) return poles;
  const delay = delayOf(fields);
  return delay.ok ? plantOfRoots(gain, zeros.value, poles.value, delay.value) : delay;
}

function parametersOf(fields: Fields): TextResult<RawPlant> {
  const values: ParameterValues = {};
  for (const [key, value] of Object.entries(fields)) {
    const word = key.slice(0, 30);
    const name = parameterName(key);
    if (!name) return refuse('UNKNOWN_SYMBOL', `“${word}” is not known here. Use ${KNOWN_NAMES}.`);
    if (typeof value !== 'number') return refuse('SYNTAX', `“${word}” must be a number.`);
    if (values[name] !== undefined)
      return refuse('AMBIGUOUS', `“${word}” is stated twice under different names. State it once.`);
    values[name] = value;
  }
  return plantOfParameters(values);
}

function parsed(text: string): TextResult<unknown> {
  try {
    return ok(JSON.parse(text));
  } catch (error) {
    const place = /position (\d+)/.exec(error instanceof Error ? error.message : '');
    return refuse(
      'SYNTAX',
      'This is not valid JSON. Write {"num": [2], "den": [10, 1], "delay": 3}.',
      place ? Math.min(Number(place[1]), text.length) : undefined,
    );
  }
}

/** JSON: {num, den, delay}, {gain, zeros, poles, delay}, or named parameters. */
export function readJsonPlant(text: string): TextResult<RawPlant> {
  const json = parsed(text);
  if (!json.ok) return json;
  if (typeof json.value !== 'object' || json.value === null || Array.isArray(json.value))
    return refuse('SYNTAX', 'The JSON must be an object such as {"num": [2], "den": [10, 1]}.');
  const fields = json.value as Fields;
  const [known, read] =
    'num' in fields || 'den' in fields
      ? [['num', 'den'], coefficientsOf]
      : 'poles' in fields || 'zeros' in fields
        ? [['gain', 'zeros', 'poles'], gainZerosPolesOf]
        : [null, parametersOf];
  const clean = known ? unknownField(fields, known) : ok(null);
  return clean.ok ? read(fields) : clean;
}
