import { and, eq, gt, isNull } from 'drizzle-orm';
import { getIronSession, type SessionOptions } from 'iron-session';
import { cookies } from 'next/headers';
import { cache } from 'react';
import { withSystem } from '../../db/tx';
import { memberships, organisations, persons, sessions } from '../../db/schema';
import { appUrl, environment } from '../env';
import { mintScope } from './scope';
import type { Session } from './session-type';
import { sessionFromBearer } from './tokens';

export type { Session } from './session-type';

export const SESSION_HOURS = 12;

interface Sealed {
  sessionId?: string;
}

function options(): SessionOptions {
  return {
    cookieName: 'fettle_session',
    password: environment().SESSION_SECRET,
    ttl: SESSION_HOURS * 3600,
    cookieOptions: { httpOnly: true, sameSite: 'lax', secure: appUrl().startsWith('https:'), path: '/' },
  };
}

async function sealed() {
  return getIronSession<Sealed>(await cookies(), options());
}

export async function startSession(sessionId: string): Promise<void> {
  const cookie = await sealed();
  cookie.sessionId = sessionId;
  await cookie.save();
}

/** Ends the session in the database too, so that a copied cookie is worth nothing afterwards. */
export async function endSession(): Promise<void> {
  const cookie = await sealed();
  const id = cookie.sessionId;
  if (id)
    await withSystem((tx) => tx.update(sessions).set({ endedAt: new Date() }).where(eq(sessions.id, id)));
  cookie.destroy();
}

async function load(sessionId: string): Promise<Session | null> {
  const [row] = await withSystem((tx) =>
    tx
      .select({
        person: { id: persons.id, name: persons.name, email: persons.email },
        organisation: {
          id: organisations.id,
          name: organisations.name,
          onePersonShop: organisations.onePersonShop,
        },
        roles: memberships.roles,
      })
      .from(sessions)
      .innerJoin(persons, eq(persons.id, sessions.personId))
      .innerJoin(organisations, eq(organisations.id, sessions.orgId))
      .innerJoin(
        memberships,
        and(eq(memberships.orgId, sessions.orgId), eq(memberships.personId, sessions.personId)),
      )
      .where(
        and(
          eq(sessions.id, sessionId),
          isNull(sessions.endedAt),
          gt(sessions.expiresAt, new Date()),
          isNull(persons.deactivatedAt),
        ),
      ),
  );
  if (!row) return null;
  const { person, organisation, roles } = row;
  const actor = {
    kind: 'person' as const,
    id: person.id,
    name: person.name,
    roles,
    onePersonShop: organisation.onePersonShop,
  };
  return { sessionId, person, organisation, roles, scope: mintScope(organisation.id, actor) };
}

/** Who is signed in, read once a request; null for nobody. */
export const currentSession = cache(async (): Promise<Session | null> => {
  const { sessionId } = await sealed();
  return sessionId ? load(sessionId) : null;
});

/** The person behind an API request: a bearer token when one is sent, the cookie otherwise. */
export async function sessionOf(request: Request): Promise<Session | null> {
  const header = request.headers.get('authorization');
  return header ? sessionFromBearer(header) : currentSession();
}

/** Nobody has an account here yet. */
export async function needsSetUp(): Promise<boolean> {
  const rows = await withSystem((tx) => tx.select({ id: persons.id }).from(persons).limit(1));
  return rows.length === 0;
}
