import type { z } from 'zod';
import { FettleError, type FieldError } from '../errors';
import './words';

/** Malformed input is 400; a well-formed request that asks for the impossible (an improper plant, say) is 422. */
export function schemaError(error: z.ZodError): FettleError {
  const fields: FieldError[] = error.issues.map(({ path, message }) => ({
    path: path.map(String).join('.'),
    message,
  }));
  const impossible = error.issues.every(
    (issue) => issue.code === 'custom' && issue.params?.impossible === true,
  );
  const [first] = fields;
  const detail = first.path ? `${first.path}: ${first.message}` : first.message;
  return new FettleError(impossible ? 'INVALID' : 'MALFORMED', detail, { fields });
}
