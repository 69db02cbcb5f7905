import { createHash, randomBytes } from 'node:crypto';
import { and, eq, gt, isNull, lt, or } from 'drizzle-orm';
import type { Transaction } from '../../db/client';
import { withSystem } from '../../db/tx';
import { apiTokens, memberships, organisations, persons } from '../../db/schema';
import { mintScope } from './scope';
import type { Session } from './session-type';

const PREFIX = 'fettle_';

export function newToken(): { token: string; tokenHash: string } {
  const token = PREFIX + randomBytes(32).toString('base64url');
  return { token, tokenHash: hashToken(token) };
}

/** Tokens are random enough that a plain hash keeps them; nothing could be guessed from it. */
function hashToken(token: string): string {
  return createHash('sha256').update(token).digest('hex');
}

/** To the minute: a program that asks often does not write as often. */
async function noteUse(tx: Transaction, tokenId: string): Promise<void> {
  const now = new Date();
  const aMinuteAgo = new Date(now.getTime() - 60_000);
  await tx
    .update(apiTokens)
    .set({ lastUsedAt: now })
    .where(
      and(eq(apiTokens.id, tokenId), or(isNull(apiTokens.lastUsedAt), lt(apiTokens.lastUsedAt, aMinuteAgo))),
    );
}

/** The person behind `Authorization: Bearer …`, with no more rights than both the token and the person have. */
export async function sessionFromBearer(header: string): Promise<Session | null> {
  const token = /^Bearer\s+(\S+)$/i.exec(header)?.[1];
  if (!token?.startsWith(PREFIX)) return null;
  const [row] = await withSystem(async (tx) => {
    const rows = await tx
      .select({
        tokenId: apiTokens.id,
        role: apiTokens.role,
        person: { id: persons.id, name: persons.name, email: persons.email },
        organisation: {
          id: organisations.id,
          name: organisations.name,
          onePersonShop: organisations.onePersonShop,
        },
        roles: memberships.roles,
      })
      .from(apiTokens)
      .innerJoin(persons, eq(persons.id, apiTokens.personId))
      .innerJoin(organisations, eq(organisations.id, apiTokens.orgId))
      .innerJoin(
        memberships,
        and(eq(memberships.orgId, apiTokens.orgId), eq(memberships.personId, apiTokens.personId)),
      )
      .where(
        and(
          eq(apiTokens.tokenHash, hashToken(token)),
          gt(apiTokens.expiresAt, new Date()),
          isNull(apiTokens.revokedAt),
          isNull(persons.deactivatedAt),
        ),
      );
    if (rows[0]) await noteUse(tx, rows[0].tokenId);
    return rows;
  });
  if (!row) return null;
  const { person, organisation } = row;
  const roles = row.roles.filter((role) => role === row.role);
  const actor = {
    kind: 'token' as const,
    id: person.id,
    name: person.name,
    roles,
    onePersonShop: organisation.onePersonShop,
  };
  return { sessionId: null, person, organisation, roles, scope: mintScope(organisation.id, actor) };
}
