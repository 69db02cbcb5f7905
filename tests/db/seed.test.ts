import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { closeDatabase, database } from '../../db/client';
import { migrateDatabase } from '../../db/migrate';
import { listChanges } from '../../db/queries/changes';
import { listMachinesWithAxes } from '../../db/queries/machines';
import { changes, gainSets, organisations } from '../../db/schema';
import { seedDemo } from '../../db/seed';
import { withScope } from '../../db/tx';
import { verifyAudit, verifyChangeEvents, verifyVersions } from '../../lib/audit/verify';
import { signIn } from '../../lib/auth/sign-in';
import { mintScope } from '../../lib/auth/scope';
import { freshDatabase, type FreshDatabase } from '../support/fresh-database';

const PASSWORD = 'a password for the demo';

describe('the demo', () => {
  let fresh: FreshDatabase;

  beforeAll(async () => {
    fresh = await freshDatabase();
    process.env.DATABASE_URL = fresh.url;
    await migrateDatabase(fresh.url);
  });
  afterAll(async () => {
    await closeDatabase();
    await fresh.drop();
  });

  it('is written once, also when two programs start at once', async () => {
    const outcomes = await Promise.all([seedDemo({ password: PASSWORD }), seedDemo({ password: PASSWORD })]);
    expect(outcomes.sort()).toEqual([false, true]);
    expect(await seedDemo({ password: PASSWORD })).toBe(false);
    const names = await database().select({ name: organisations.name }).from(organisations);
    expect(names.map(({ name }) => name).sort()).toEqual(['Brackwater Packing', 'Northgate Pumps']);
  });

  it.each(['engineer@brackwater', 'approver@brackwater', 'technician@brackwater', 'admin@brackwater'])(
    'lets %s.example in, in that role',
    async (name) => {
      const { who } = await signIn({ email: `${name}.example`, password: PASSWORD, address: 'seed test' });
      expect(who.roles).toEqual([name.split('@')[0]]);
    },
  );

  it('has seven axes, versions checked by both engines, changes in several states, and whole chains', async () => {
    const rows = await database()
      .select({ orgId: organisations.id, name: organisations.name })
      .from(organisations);
    for (const { orgId, name } of rows) {
      const actor = { kind: 'system', id: null, name: 'test', roles: [], onePersonShop: false } as const;
      const scope = mintScope(orgId, actor);
      await withScope(scope, async (tx) => {
        const axes = (await listMachinesWithAxes(tx, scope)).flatMap((machine) => machine.axes);
        expect(axes).toHaveLength(name === 'Brackwater Packing' ? 7 : 1);
        expect((await verifyAudit(tx, scope)).because).toBeNull();
        for (const { id } of axes) expect((await verifyVersions(tx, scope, id)).because).toBeNull();
        for (const { id } of await listChanges(tx, scope, { limit: 100 }))
          expect((await verifyChangeEvents(tx, scope, id)).because).toBeNull();
      });
    }
    const versions = await database().select().from(gainSets);
    for (const { checks } of versions)
      for (const { engines } of checks) {
        expect(engines?.engines).toEqual(['exact', 'ode']);
        expect(engines?.agreement).toBeLessThan(1e-3);
      }
    const states = new Set(
      (await database().select({ state: changes.state }).from(changes)).map((row) => row.state),
    );
    expect([...states].sort()).toEqual(['applied', 'draft', 'issued', 'submitted', 'verified']);
  });
});
