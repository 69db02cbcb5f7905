import { FettleError } from '../errors';

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
