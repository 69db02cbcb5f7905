import { lt, type SQL } from 'drizzle-orm';
import type { PgColumn } from 'drizzle-orm/pg-core';

/** Largest number of an integer column; the database refuses to compare one with anything larger. */
export const LARGEST_INTEGER = 2_147_483_647;

/** Rows before a cursor that stands for a number; all of them without one. */
export function before(column: PgColumn, after: number | undefined): SQL | undefined {
  return after === undefined ? undefined : lt(column, Math.min(after, LARGEST_INTEGER));
}
