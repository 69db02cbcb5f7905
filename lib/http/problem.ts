import type { FettleError } from '../errors';

const STATUS: Record<FettleError['code'], { status: number; title: string }> = {
  MALFORMED: { status: 400, title: 'The request can’t be read' },
  UNAUTHENTICATED: { status: 401, title: 'Not signed in' },
  FORBIDDEN: { status: 403, title: 'Not permitted' },
  NOT_FOUND: { status: 404, title: 'Not found' },
  CONFLICT: { status: 409, title: 'Conflicts with what is there' },
  TOO_LARGE: { status: 413, title: 'Too large' },
  WRONG_MEDIA_TYPE: { status: 415, title: 'Wrong kind of content' },
  INVALID: { status: 422, title: 'Can’t be done as asked' },
  TOO_MANY: { status: 429, title: 'Too many attempts' },
};

/** An RFC 9457 problem answer. */
export function problemResponse(error: FettleError): Response {
  const { status, title } = STATUS[error.code];
  const body = {
    type: `/api#${error.code.toLowerCase().replaceAll('_', '-')}`,
    title,
    status,
    detail: error.message,
    ...(error.fields ? { errors: error.fields } : {}),
  };
  const headers: Record<string, string> = { 'content-type': 'application/problem+json' };
  if (error.retryAfterS !== undefined) headers['retry-after'] = String(Math.ceil(error.retryAfterS));
  return new Response(JSON.stringify(body), { status, headers });
}

/** For what nobody foresaw: an id that the log has too, and nothing else. */
export function unknownProblem(id: string): Response {
  const body = {
    type: '/api#unknown',
    title: 'Something went wrong here',
    status: 500,
    detail: `It is not your doing. Give this number to whoever looks after the server: ${id}.`,
  };
  return new Response(JSON.stringify(body), {
    status: 500,
    headers: { 'content-type': 'application/problem+json' },
  });
}
