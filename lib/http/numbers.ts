/** Numbers as the API writes them: infinite as "inf" or "-inf", not-a-value as null, typed arrays as lists. */
export function encodeNumbers(value: unknown): unknown {
  if (typeof value === 'number') {
    if (Number.isNaN(value)) return null;
    if (value === Infinity) return 'inf';
    return value === -Infinity ? '-inf' : value;
  }
  if (ArrayBuffer.isView(value)) return Array.from(value as Float64Array, encodeNumbers);
  if (Array.isArray(value)) return value.map(encodeNumbers);
  if (value instanceof Date) return value.toISOString();
  if (typeof value === 'object' && value !== null)
    return Object.fromEntries(Object.entries(value).map(([key, item]) => [key, encodeNumbers(item)]));
  return value;
}
