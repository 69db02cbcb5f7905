import { apiTokens } from '../../../db/schema';
import { withScope } from '../../../db/tx';
import { emitAudit } from '../../audit/emit';
import { authorise } from '../../auth/permissions';
import { personOf, type Scope } from '../../auth/scope';
import { newToken } from '../../auth/tokens';
import { FettleError } from '../../errors';
import { tokenInput } from '../../schemas/token';
import { parseInput } from '../parse-input';

/**
 * Makes a bearer token with one of the person's own roles. It is shown this once; only its hash is stored.
 *
 * @throws FettleError MALFORMED, or FORBIDDEN for a role that the person does not have or a request with a token
 */
export async function createToken(
  scope: Scope,
  input: unknown,
): Promise<{ id: string; token: string; expiresAt: Date }> {
  const permitted = authorise(scope, 'token.make');
  const { name, role, days } = parseInput(tokenInput, input);
  const person = personOf(scope);
  if (scope.actor.kind !== 'person')
    throw new FettleError('FORBIDDEN', 'A token can’t make tokens; sign in for that.');
  if (!scope.actor.roles.includes(role))
    throw new FettleError('FORBIDDEN', `You are no ${role}, so a token of yours can’t be one.`);
  const { token, tokenHash } = newToken();
  const expiresAt = new Date(Date.now() + days * 86_400_000);
  return withScope(scope, async (tx) => {
    const [{ id }] = await tx
      .insert(apiTokens)
      .values({ orgId: scope.orgId, personId: person.id, name, role, tokenHash, expiresAt })
      .returning({ id: apiTokens.id });
    await emitAudit(tx, permitted, {
      action: 'create',
      subjectKind: 'token',
      subjectId: id,
      detail: { name, role, expiresAt: expiresAt.toISOString() },
    });
    return { id, token, expiresAt };
  });
}
