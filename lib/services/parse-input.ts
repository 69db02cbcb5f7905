import type { z } from 'zod';
import { schemaError } from '../schemas/schema-error';

/** Reads a service's input by its schema; the same errors whether it came from a form, a page or the API. */
export function parseInput<Schema extends z.ZodType>(schema: Schema, input: unknown): z.output<Schema> {
  const read = schema.safeParse(input);
  if (!read.success) throw schemaError(read.error);
  return read.data;
}
