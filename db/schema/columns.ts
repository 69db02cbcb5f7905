import { customType, timestamp, uuid } from 'drizzle-orm/pg-core';

const INFINITE = { 'number:inf': Infinity, 'number:-inf': -Infinity } as const;

/** JSON has no infinite numbers, a controller without integral has one: written as a marker that no text of ours is. */
function write(value: unknown): unknown {
  if (value === Infinity) return 'number:inf';
  if (value === -Infinity) return 'number:-inf';
  if (ArrayBuffer.isView(value)) return Array.from(value as Float64Array, write);
  if (Array.isArray(value)) return value.map(write);
  if (typeof value === 'object' && value !== null)
    return Object.fromEntries(Object.entries(value).map(([key, item]) => [key, write(item)]));
  return value;
}

function read(value: unknown): unknown {
  if (typeof value === 'string' && value in INFINITE) return INFINITE[value as keyof typeof INFINITE];
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
