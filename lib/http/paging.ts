import { FettleError } from '../errors';

const MOST = 200;

/** `?limit&after` of a list; the cursor is opaque to the caller. */
export function pageOf(query: URLSearchParams): { limit: number; after: string | null } {
  const text = query.get('limit') ?? '50';
  const limit = Number(text);
  if (!Number.isInteger(limit) || limit < 1 || limit > MOST)
    throw new FettleError(
      'MALFORMED',
      `limit must be a whole number from 1 to ${MOST}, not “${text.slice(0, 20)}”.`,
    );
  return { limit, after: query.get('after') };
}

/** A cursor that stands for a number: a version, a change, an audit line. */
export function numberCursor(after: string | null): number | undefined {
  if (after === null) return undefined;
  const value = Number(after);
  if (!Number.isInteger(value) || value < 0)
    throw new FettleError('MALFORMED', 'after is not a cursor of this list.');
  return value;
}

/** One page: one row more than asked for was read, so that it is known whether there is a next one. */
export function pageAnswer<Row, Item>(
  rows: readonly Row[],
  limit: number,
  item: (row: Row) => Item,
  cursor: (row: Row) => string,
): { items: Item[]; next?: string } {
  const items = rows.slice(0, limit);
  const more = rows.length > limit;
  return { items: items.map(item), ...(more ? { next: cursor(items[items.length - 1]) } : {}) };
}
