export interface ValueDifference {
  /** Keys from the outside in, e.g. 'controller.kp' or 'loadCases[1].name'. */
  readonly path: string;
  readonly label?: string;
  /** undefined where the value did not exist. */
  readonly from: unknown;
  readonly to: unknown;
}

/**
 * What differs between two versions of plain data, deep, in the order of the keys of `before`, new keys last.
 *
 * Lists of objects are compared item by item; other lists (coefficients, say) count as one value. Numbers are compared
 * exactly, 0 and −0 are the same; a key with undefined is a missing key.
 *
 * @param before plain object
 * @param after plain object
 * @param labels names for paths, for the reader
 */
export function diffValues(
  before: object,
  after: object,
  labels: Readonly<Record<string, string>> = {},
): ValueDifference[] {
  return compare(before, after, '').map((difference) => {
    const label = labels[difference.path];
    return label === undefined ? difference : { ...difference, label };
  });
}

function compare(from: unknown, to: unknown, path: string): ValueDifference[] {
  if (isList(from) && isList(to)) {
    if (![...from, ...to].some(isObject)) return sameList(from, to) ? [] : [{ path, from, to }];
    const length = Math.max(from.length, to.length);
    return Array.from({ length }, (_, index) => compare(from[index], to[index], `${path}[${index}]`)).flat();
  }
  if (isObject(from) && isObject(to) && !isList(from) && !isList(to)) {
    const keys = [...new Set([...Object.keys(from), ...Object.keys(to)])];
    return keys.flatMap((key) =>
      compare(valueAt(from, key), valueAt(to, key), path === '' ? key : `${path}.${key}`),
    );
  }
  return same(from, to) ? [] : [{ path, from, to }];
}

function sameList(one: readonly unknown[], other: readonly unknown[]): boolean {
  return (
    one.length === other.length && one.every((item, index) => compare(item, other[index], '').length === 0)
  );
}

function same(one: unknown, other: unknown): boolean {
  return one === other || Object.is(one, other);
}

function valueAt(holder: object, key: string): unknown {
  return Object.hasOwn(holder, key) ? (holder as Record<string, unknown>)[key] : undefined;
}

function isList(value: unknown): value is readonly unknown[] {
  return Array.isArray(value);
}

function isObject(value: unknown): value is object {
  return typeof value === 'object' && value !== null;
}
