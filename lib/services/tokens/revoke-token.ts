import { and, eq, isNull } from 'drizzle-orm';
import { apiTokens } from '../../../db/schema';
import { withScope } from '../../../db/tx';
import { emitAudit } from '../../audit/emit';
import { authorise } from '../../auth/permissions';
import type { Scope } from '../../auth/scope';
import { FettleError, notFound } from '../../errors';
import { asId } from '../../ids';

/**
 * Ends a token at once: one's own, or as admin anybody's.
 *
 * @throws FettleError NOT_FOUND, FORBIDDEN for another person's token, CONFLICT when it is revoked already
 */
export async function revokeToken(scope: Scope, id: string): Promise<void> {
  const permitted = authorise(scope, 'token.revoke');
  await withScope(scope, async (tx) => {
    const own = and(eq(apiTokens.orgId, scope.orgId), eq(apiTokens.id, asId(id, 'token')));
    const [token] = await tx
      .select({ id: apiTokens.id, personId: apiTokens.personId, name: apiTokens.name })
      .from(apiTokens)
      .where(own);
    if (!token) throw notFound('token');
    if (token.personId !== scope.actor.id && !scope.actor.roles.includes('admin'))
      throw new FettleError('FORBIDDEN', 'That token is another person’s; an admin can revoke it.');
    const revoked = await tx
      .update(apiTokens)
      .set({ revokedAt: new Date() })
      .where(and(own, isNull(apiTokens.revokedAt)))
      .returning({ id: apiTokens.id });
    if (revoked.length === 0) throw new FettleError('CONFLICT', 'That token is revoked already.');
    await emitAudit(tx, permitted, {
      action: 'revoke',
      subjectKind: 'token',
      subjectId: token.id,
      detail: { name: token.name, personId: token.personId },
    });
  });
}
