import { notFound } from './errors';

const UUID = /^[0-9a-f]{8}-[0-9a-f]{4}-[0-9a-f]{4}-[0-9a-f]{4}-[0-9a-f]{12}$/i;

export function isId(value: string): boolean {
  return UUID.test(value);
}

/** An id from an address or a request: what isn't one belongs to nothing, so it is answered like a stranger's. */
export function asId(value: string, what: string): string {
  if (!isId(value)) throw notFound(what);
  return value.toLowerCase();
}
