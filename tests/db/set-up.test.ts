import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { closeDatabase, database } from '../../db/client';
import { migrateDatabase } from '../../db/migrate';
import { organisations, persons } from '../../db/schema';
import { needsSetUp } from '../../lib/auth/session';
import { signIn } from '../../lib/auth/sign-in';
import { setUpOrganisation } from '../../lib/services/people/set-up-organisation';
import { freshDatabase, type FreshDatabase } from '../support/fresh-database';

const INPUT = {
  organisation: 'Weir & Sluice',
  name: 'Ada Brook',
  email: 'Ada@Weir.example',
  password: 'a long password',
  onePersonShop: true,
};

describe('the first run', () => {
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

  it('refuses what it can’t use, and leaves the database empty', async () => {
    const wrong = [
      {},
      { ...INPUT, organisation: ' ' },
      { ...INPUT, email: 'no address' },
      { ...INPUT, password: 'short' },
      { ...INPUT, password: 'ä'.repeat(40) },
      { ...INPUT, name: 'two\nlines' },
    ];
    for (const input of wrong)
      await expect(setUpOrganisation(input)).rejects.toMatchObject({ code: 'MALFORMED' });
    expect(await needsSetUp()).toBe(true);
    expect(await database().select().from(organisations)).toEqual([]);
  });

  it('makes one organisation, though two people try at once, and its first person may do everything', async () => {
    const outcomes = await Promise.allSettled([
      setUpOrganisation(INPUT),
      setUpOrganisation({ ...INPUT, email: 'bo@weir.example' }),
    ]);
    expect(outcomes.map(({ status }) => status).sort()).toEqual(['fulfilled', 'rejected']);
    expect(await needsSetUp()).toBe(false);
    const [{ email }] = await database().select({ email: persons.email }).from(persons);
    expect(email).toBe(email.toLowerCase());
    const { who } = await signIn({ email, password: INPUT.password, address: 'set-up test' });
    expect([...who.roles].sort()).toEqual(['admin', 'approver', 'engineer', 'technician']);
  });
});
