import { createHash } from 'node:crypto';
import { and, eq } from 'drizzle-orm';
import { idempotencyKeys } from '../../db/schema';
import { withScope } from '../../db/tx';
import type { Session } from '../auth/session';
import { FettleError } from '../errors';

const KEY = /^[\x21-\x7e]{1,200}$/;

function digestOfRequest(request: Request, body: string): string {
  return createHash('sha256')
    .update(`${new URL(request.url).pathname}\n${body}`)
    .digest('hex');
}

/**
 * Runs a post once for its Idempotency-Key: a repeated request with the same key gets the first answer again, a
 * different one with the same key is refused, and one that is still being worked on is told so.
 */
export async function once(
  request: Request,
  session: Session,
  body: string,
  work: () => Promise<Response>,
): Promise<Response> {
  const key = request.headers.get('idempotency-key');
  if (key === null) return work();
  if (!KEY.test(key))
    throw new FettleError('MALFORMED', 'An Idempotency-Key has 1 to 200 visible characters.');
  const { scope, person } = session;
  const requestDigest = digestOfRequest(request, body);
  const own = and(
    eq(idempotencyKeys.orgId, scope.orgId),
    eq(idempotencyKeys.personId, person.id),
    eq(idempotencyKeys.key, key),
  );
  const known = await withScope(scope, async (tx) => {
    const claimed = await tx
      .insert(idempotencyKeys)
      .values({ orgId: scope.orgId, personId: person.id, key, requestDigest })
      .onConflictDoNothing()
      .returning({ key: idempotencyKeys.key });
    if (claimed.length > 0) return null;
    const [row] = await tx.select().from(idempotencyKeys).where(own);
    return row ?? null;
  });
  if (known) {
    if (known.requestDigest !== requestDigest)
      throw new FettleError('CONFLICT', 'This Idempotency-Key was used for another request.');
    if (known.status === null)
      throw new FettleError('CONFLICT', 'The same request is still being worked on.');
    return new Response(known.body === null ? null : JSON.stringify(known.body), {
      status: known.status,
      headers: { 'content-type': 'application/json', 'idempotency-replayed': 'true' },
    });
  }
  return settle();

  async function settle(): Promise<Response> {
    try {
      const response = await work();
      const answer: unknown = response.status === 204 ? null : await response.clone().json();
      await withScope(scope, (tx) =>
        tx.update(idempotencyKeys).set({ status: response.status, body: answer }).where(own),
      );
      return response;
    } catch (error) {
      // A refused request wrote nothing: its key is free again for the corrected one.
      await withScope(scope, (tx) => tx.delete(idempotencyKeys).where(own));
      throw error;
    }
  }
}
