import { randomUUID } from 'node:crypto';
import type { z } from 'zod';
import { sessionOf, type Session } from '../auth/session';
import { FettleError } from '../errors';
import { log } from '../log';
import { once } from './idempotency';
import { encodeNumbers } from './numbers';
import { problemResponse, unknownProblem } from './problem';
import { readJson } from './read-json';

export interface Call<Input> {
  session: Session;
  input: Input;
  params: Record<string, string>;
  request: Request;
}

interface Endpoint<Schema extends z.ZodType> {
  schema?: Schema;
  /** Status of a success; 200 when not given. */
  status?: number;
  run: (call: Call<z.output<Schema>>) => Promise<unknown>;
}

type Handler = (request: Request, context: { params: Promise<Record<string, string>> }) => Promise<Response>;

/** A page of another site can make a browser post with its cookie; its Origin gives it away. */
export function refuseForeignOrigin(request: Request): void {
  const origin = request.headers.get('origin');
  if (request.method === 'GET' || origin === null) return;
  const host = request.headers.get('x-forwarded-host') ?? request.headers.get('host');
  if (!URL.canParse(origin) || new URL(origin).host !== host)
    throw new FettleError('FORBIDDEN', 'The request comes from a page of another site.');
}

export function jsonResponse(value: unknown, status = 200): Response {
  if (value === undefined || value === null) return new Response(null, { status: 204 });
  return new Response(JSON.stringify(encodeNumbers(value)), {
    status,
    headers: { 'content-type': 'application/json', 'cache-control': 'no-store' },
  });
}

/** Turns whatever went wrong into a problem answer; what nobody foresaw is logged under an id. */
export async function answering(work: () => Promise<Response>): Promise<Response> {
  try {
    return await work();
  } catch (error) {
    if (error instanceof FettleError) return problemResponse(error);
    const id = randomUUID();
    log.error({ id, error }, 'unexpected error in an API route');
    return unknownProblem(id);
  }
}

/** The one shape of a route: session, body by its schema, service, answer. */
export function endpoint<Schema extends z.ZodType = z.ZodType<unknown>>(options: Endpoint<Schema>): Handler {
  return (request, context) =>
    answering(async () => {
      refuseForeignOrigin(request);
      const session = await sessionOf(request);
      if (!session) throw new FettleError('UNAUTHENTICATED', 'Sign in, or send a bearer token.');
      const params = await context.params;
      const input = (
        options.schema ? await readJson(request, options.schema) : undefined
      ) as z.output<Schema>;
      const work = async () =>
        jsonResponse(await options.run({ session, input, params, request }), options.status);
      return request.method === 'POST' ? once(request, session, input, work) : work();
    });
}
