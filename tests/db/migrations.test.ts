import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { migrateDatabase } from '../../db/migrate';
import { asOwner, freshDatabase, type FreshDatabase } from '../support/fresh-database';

describe('bringing a database up to date', () => {
  let fresh: FreshDatabase;

  beforeAll(async () => {
    fresh = await freshDatabase();
  });
  afterAll(() => fresh.drop());

  const applied = () =>
    asOwner(fresh.url, async (client) => {
      const { rows } = await client.query<{ n: number }>(
        'select count(*)::int as n from drizzle.__drizzle_migrations',
      );
      return rows[0].n;
    });

  it('works from nothing, for three programs that start at once, and does nothing the next time', async () => {
    await Promise.all([1, 2, 3].map(() => migrateDatabase(fresh.url)));
    const once = await applied();
    expect(once).toBeGreaterThanOrEqual(4);
    await migrateDatabase(fresh.url);
    expect(await applied()).toBe(once);
  });

  it('refuses a database that newer code has written, and leaves it alone', async () => {
    const newer = Date.UTC(2999, 0);
    await asOwner(fresh.url, (client) =>
      client.query(`insert into drizzle.__drizzle_migrations (hash, created_at) values ('newer', $1)`, [
        newer,
      ]),
    );
    const before = await applied();
    await expect(migrateDatabase(fresh.url)).rejects.toMatchObject({ code: 'NEWER_SCHEMA' });
    expect(await applied()).toBe(before);
  });
});
