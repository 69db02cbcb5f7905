import { randomUUID } from 'node:crypto';
import type { z } from 'zod';
import { sessionOf, type Session } from '../auth/session';
import { FettleError } from '../errors';
import { log } from '../log';
import { once } from './idempotency';
import { encodeNumbers } from './numbers';
import { problemResponse, unknownProblem } from './problem';
import { schemaError } from '../schemas/schema-error';
import { readBody } from './read-json';

export interface Call<Input> {
  readonly session: Session;
  /** The body, read by the endpoint's schema; as it came when the endpoint has none (its service reads it). */
  readonly input: Input;
  readonly params: Record<string, string>;
  readonly query: URLSearchParams;
}

interface Endpoint<Input> {
  readonly schema?: z.ZodType<Input>;
  /** Status of a success; 200 when not given. */
  readonly status?: number;
  readonly run: (call: Call<Input>) => Promise<unknown>;
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
    log.error({ id, err: error }, 'unexpected error in an API route');
    return unknownProblem(id);
  }
}

/** The one shape of a route: session, body by its schema, service, answer. */
export function endpoint<Input = unknown>(options: Endpoint<Input>): Handler {
  return (request, context) =>
    answering(async () => {
      refuseForeignOrigin(request);
      const session = await sessionOf(request);
      if (!session) throw new FettleError('UNAUTHENTICATED', 'Sign in, or send a bearer token.');
      const params = await context.params;
      const query = new URL(request.url).searchParams;
      const hasBody = request.method !== 'GET' && request.method !== 'DELETE';
      const body = hasBody ? await readBody(request) : { text: '', json: undefined };
      const work = async () => {
        const input = options.schema ? bySchema(options.schema, body.json) : (body.json as Input);
        return jsonResponse(await options.run({ session, input, params, query }), options.status);
      };
      return request.method === 'POST' ? once(request, session, body.text, work) : work();
    });
}

function bySchema<Input>(schema: z.ZodType<Input>, json: unknown): Input {
  const read = schema.safeParse(json);
  if (!read.success) throw schemaError(read.error);
  return read.data;
}
