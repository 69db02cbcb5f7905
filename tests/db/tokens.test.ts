import { eq } from 'drizzle-orm';
import { afterAll, describe, expect, it } from 'vitest';
import { closeDatabase, database } from '../../db/client';
import { listTokens } from '../../db/queries/tokens';
import { apiTokens, memberships, persons } from '../../db/schema';
import { withScope } from '../../db/tx';
import { sessionFromBearer } from '../../lib/auth/tokens';
import { createMachine } from '../../lib/services/machines/create-machine';
import { changePassword } from '../../lib/services/people/change-password';
import { createToken } from '../../lib/services/tokens/create-token';
import { revokeToken } from '../../lib/services/tokens/revoke-token';
import { anOrganisation, PASSWORD } from '../support/factories';

afterAll(closeDatabase);

const asEngineer = { name: 'reports', role: 'engineer', days: 1 };

async function aToken() {
  const organisation = await anOrganisation();
  const made = await createToken(organisation.scopes.colleague, asEngineer);
  const open = () => sessionFromBearer(`Bearer ${made.token}`);
  return { organisation, made, open };
}

describe('an API token', () => {
  it('acts as its person in the one role it was made for, and is stored as a hash alone', async () => {
    const { organisation, made, open } = await aToken();
    const session = await open();
    expect(session?.person.email).toBe(organisation.emailOf('colleague'));
    expect(session?.roles).toEqual(['engineer']);
    expect(session?.scope.actor.kind).toBe('token');
    const rows = await database().select().from(apiTokens).where(eq(apiTokens.id, made.id));
    expect(JSON.stringify(rows)).not.toContain(made.token);
    expect(rows[0].lastUsedAt).not.toBeNull();
  });

  it('opens nothing when it is mistyped, over, revoked, or its person is gone', async () => {
    const { organisation, made, open } = await aToken();
    for (const header of ['', 'Bearer', `Basic ${made.token}`, `Bearer ${made.token}x`, 'Bearer fettle_'])
      expect(await sessionFromBearer(header), header).toBeNull();
    const change = (set: Partial<typeof apiTokens.$inferInsert>) =>
      database().update(apiTokens).set(set).where(eq(apiTokens.id, made.id));
    const { expiresAt } = made;
    await change({ expiresAt: new Date(Date.now() - 1000) });
    expect(await open()).toBeNull();
    await change({ expiresAt });
    expect(await open()).not.toBeNull();
    const email = organisation.emailOf('colleague');
    await database().update(persons).set({ deactivatedAt: new Date() }).where(eq(persons.email, email));
    expect(await open()).toBeNull();
    await database().update(persons).set({ deactivatedAt: null }).where(eq(persons.email, email));
    await revokeToken(organisation.scopes.colleague, made.id);
    expect(await open()).toBeNull();
  });

  it('loses a role that its person lost', async () => {
    const { organisation, open } = await aToken();
    await database()
      .update(memberships)
      .set({ roles: ['approver'] })
      .where(eq(memberships.personId, organisation.scopes.colleague.actor.id ?? ''));
    const session = await open();
    expect(session?.roles).toEqual([]);
    if (!session) return;
    await expect(createMachine(session.scope, { site: 'x', name: 'y' })).rejects.toMatchObject({
      code: 'FORBIDDEN',
    });
  });

  it('makes no token, changes no password, and is never more than its person', async () => {
    const { organisation, open } = await aToken();
    const session = await open();
    if (!session) throw new Error('the token does not open');
    await expect(createToken(session.scope, asEngineer)).rejects.toMatchObject({ code: 'FORBIDDEN' });
    await expect(
      changePassword(session.scope, { current: PASSWORD, next: 'another password' }),
    ).rejects.toMatchObject({ code: 'FORBIDDEN' });
    await expect(createToken(organisation.scopes.technician, asEngineer)).rejects.toMatchObject({
      code: 'FORBIDDEN',
    });
  });

  it('is revoked by its person or an admin, by nobody else, and once', async () => {
    const { organisation, made } = await aToken();
    const { engineer, admin } = organisation.scopes;
    const stranger = (await anOrganisation()).scopes.admin;
    await expect(revokeToken(stranger, made.id)).rejects.toMatchObject({ code: 'NOT_FOUND' });
    await expect(revokeToken(engineer, made.id)).rejects.toMatchObject({ code: 'FORBIDDEN' });
    await revokeToken(admin, made.id);
    await expect(revokeToken(admin, made.id)).rejects.toMatchObject({ code: 'CONFLICT' });
    const lines = await withScope(admin, (tx) => listTokens(tx, admin));
    expect(lines.map(({ id, revokedAt }) => [id, revokedAt !== null])).toEqual([[made.id, true]]);
    const mine = await withScope(engineer, (tx) =>
      listTokens(tx, engineer, { personId: engineer.actor.id ?? '' }),
    );
    expect(mine).toEqual([]);
  });
});
