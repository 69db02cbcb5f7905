/**
 * One text for one content, whatever the order in which its keys were written: the ground of digests and signatures.
 *
 * JSON without blanks; keys sorted by UTF-16 code units, numbers and strings as ECMAScript writes them, as in RFC 8785
 * (JSON Canonicalization Scheme). Beyond it: Infinity is "inf" and −Infinity "-inf", as in the public API; −0 is 0; keys
 * with undefined are dropped; typed arrays count as lists.
 *
 * @param value plain data: null, booleans, numbers, strings, lists and plain objects
 * @throws TypeError for NaN, undefined outside an object, functions, symbols, big integers, class instances (also Date:
 *   pass its ISO text), broken Unicode and cycles, with the path to it
 */
export function canonicalText(value: unknown): string {
  return textOf(value, '$', []);
}

function textOf(value: unknown, path: string, above: readonly object[]): string {
  if (value === null || typeof value === 'boolean') return String(value);
  if (typeof value === 'number') return numberText(value, path);
  if (typeof value === 'string') return stringText(value, path);
  if (typeof value !== 'object')
    throw new TypeError(`${path} is ${typeof value}; only plain data has a canonical text`);
  if (above.includes(value)) throw new TypeError(`${path} contains itself`);
  const below = [...above, value];
  const list = asList(value);
  if (list) return `[${list.map((item, index) => textOf(item, `${path}[${index}]`, below)).join(',')}]`;
  if (!isPlainObject(value)) {
    throw new TypeError(`${path} is a ${value.constructor.name}; only plain data has a canonical text`);
  }
  const entries = Object.entries(value)
    .filter(([, item]) => item !== undefined)
    .sort(([one], [other]) => (one < other ? -1 : 1));
  return `{${entries.map(([key, item]) => `${stringText(key, path)}:${textOf(item, `${path}.${key}`, below)}`).join(',')}}`;
}

function numberText(value: number, path: string): string {
  if (Number.isNaN(value)) throw new TypeError(`${path} is not a number (NaN)`);
  if (value === Infinity) return '"inf"';
  if (value === -Infinity) return '"-inf"';
  return JSON.stringify(value === 0 ? 0 : value);
}

function stringText(value: string, path: string): string {
  if (/\p{Surrogate}/u.test(value)) throw new TypeError(`${path} holds half a Unicode character`);
  return JSON.stringify(value);
}

function asList(value: object): readonly unknown[] | null {
  if (Array.isArray(value)) return Array.from<unknown>(value);
  return value instanceof Float64Array || value instanceof Float32Array ? Array.from(value) : null;
}

function isPlainObject(value: object): boolean {
  const prototype: unknown = Object.getPrototypeOf(value);
  return prototype === Object.prototype || prototype === null;
}
