import { customType, timestamp, uuid } from 'drizzle-orm/pg-core';

/** A text that reads as a marker, or as one that was already set apart: it is set apart once more. */
const MARKER = /^(?:text:)*number:-?inf$/;
const APART = 'text:';

const INFINITE = { 'number:inf': Infinity, 'number:-inf': -Infinity } as const;

/** JSON has no infinite numbers, a controller without integral has one: written as a marker, and a text like it set apart. */
function write(value: unknown): unknown {
  if (value === Infinity) return 'number:inf';
  if (value === -Infinity) return 'number:-inf';
  if (typeof value === 'string') return MARKER.test(value) ? APART + value : value;
  if (ArrayBuffer.isView(value)) return Array.from(value as Float64Array, write);
  if (Array.isArray(value)) return value.map(write);
  if (typeof value === 'object' && value !== null)
    return Object.fromEntries(Object.entries(value).map(([key, item]) => [key, write(item)]));
  return value;
}

function readText(text: string): string | number {
  if (text === 'number:inf' || text === 'number:-inf') return INFINITE[text];
  return MARKER.test(text) ? text.slice(APART.length) : text;
}

function read(value: unknown): unknown {
  if (typeof value === 'string') return readText(value);
  if (Array.isArray(value)) return value.map(read);
  if (typeof value === 'object' && value !== null)
    return Object.fromEntries(Object.entries(value).map(([key, item]) => [key, read(item)]));
  return value;
}

const jsonWithInfinity = customType<{ data: unknown; driverData: unknown }>({
  dataType: () => 'jsonb',
  toDriver: (value) => JSON.stringify(write(value)),
  fromDriver: read,
});

/** A jsonb column of our own shape, infinite numbers included. */
export function json<T>(name: string) {
  return jsonWithInfinity(name).$type<T>();
}

export const moment = (name: string) => timestamp(name, { withTimezone: true, mode: 'date' });

/** Every table of an organisation leads its keys with this. */
export const orgId = () => uuid('org_id').notNull();
