import type { z } from 'zod';
import { FettleError, type FieldError } from '../errors';

const LARGEST_BODY = 1_000_000;

/** The body as text and as JSON; every way in which it can be wrong has its own answer. */
export async function readBody(request: Request): Promise<{ text: string; json: unknown }> {
  const declared = Number(request.headers.get('content-length') ?? 0);
  if (declared > LARGEST_BODY) throw new FettleError('TOO_LARGE', 'The request is larger than 1 MB.');
  const text = await request.text();
  if (text.length > LARGEST_BODY) throw new FettleError('TOO_LARGE', 'The request is larger than 1 MB.');
  if (text.trim() === '') return { text, json: {} };
  const type = request.headers.get('content-type') ?? '';
  if (!/^application\/([\w.+-]+\+)?json\b/i.test(type))
    throw new FettleError('WRONG_MEDIA_TYPE', 'Send JSON with content-type application/json.');
  try {
    return { text, json: JSON.parse(text) };
  } catch {
    throw new FettleError('MALFORMED', 'The body is not JSON.');
  }
}

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
