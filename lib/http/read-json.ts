import type { z } from 'zod';
import { FettleError } from '../errors';
import type { FieldProblem } from './problem';

const LARGEST_BODY = 1_000_000;

async function bodyText(request: Request): Promise<string> {
  const declared = Number(request.headers.get('content-length') ?? 0);
  if (declared > LARGEST_BODY) throw new FettleError('TOO_LARGE', 'The request is larger than 1 MB.');
  const text = await request.text();
  if (text.length > LARGEST_BODY) throw new FettleError('TOO_LARGE', 'The request is larger than 1 MB.');
  return text;
}

function wordsFor(path: PropertyKey[]): string {
  return path.map(String).join('.');
}

/** Malformed input is 400; a well-formed request that asks for the impossible (an improper plant, say) is 422. */
export function schemaError(error: z.ZodError): FettleError {
  const fields: FieldProblem[] = error.issues.map((issue) => ({
    path: wordsFor(issue.path),
    message: issue.message,
  }));
  const impossible = error.issues.every(
    (issue) => issue.code === 'custom' && issue.params?.impossible === true,
  );
  const first = fields[0];
  const detail = first.path ? `${first.path}: ${first.message}` : first.message;
  return new FettleError(impossible ? 'INVALID' : 'MALFORMED', detail, { fields });
}

/** Reads and checks a JSON body; every way in which it can be wrong has its own answer. */
export async function readJson<Schema extends z.ZodType>(
  request: Request,
  schema: Schema,
): Promise<z.output<Schema>> {
  const type = request.headers.get('content-type') ?? '';
  const text = await bodyText(request);
  if (text.trim() !== '' && !/^application\/([\w.+-]+\+)?json\b/i.test(type))
    throw new FettleError('WRONG_MEDIA_TYPE', 'Send JSON with content-type application/json.');
  let json: unknown;
  try {
    json = text.trim() === '' ? {} : JSON.parse(text);
  } catch {
    throw new FettleError('MALFORMED', 'The body is not JSON.');
  }
  const read = schema.safeParse(json);
  if (!read.success) throw schemaError(read.error);
  return read.data;
}
