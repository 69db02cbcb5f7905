import { readFile } from 'node:fs/promises';
import { fileURLToPath } from 'node:url';
import { drizzle } from 'drizzle-orm/node-postgres';
import { migrate } from 'drizzle-orm/node-postgres/migrator';
import { Client } from 'pg';

const folder = fileURLToPath(new URL('./migrations', import.meta.url));
const LOCK = 715_230_611;

async function newestKnown(): Promise<number> {
  const journal = JSON.parse(await readFile(`${folder}/meta/_journal.json`, 'utf8')) as {
    entries: { when: number }[];
  };
  return Math.max(0, ...journal.entries.map(({ when }) => when));
}

async function newestApplied(client: Client): Promise<number> {
  const there = await client.query<{ there: boolean }>(
    `select to_regclass('drizzle.__drizzle_migrations') is not null as there`,
  );
  if (!there.rows[0].there) return 0;
  const rows = await client.query<{ newest: string | null }>(
    'select max(created_at) as newest from drizzle.__drizzle_migrations',
  );
  return Number(rows.rows[0].newest ?? 0);
}

/**
 * Brings a database up to the schema of this code. Two starts at once wait for each other.
 *
 * @param url connection string of a user that may create tables and a role
 * @throws Error with code NEWER_SCHEMA when the database was written by newer code; errors of PostgreSQL as they come
 */
export async function migrateDatabase(url: string): Promise<void> {
  const client = new Client({ connectionString: url, connectionTimeoutMillis: 10_000 });
  await client.connect();
  try {
    await client.query('select pg_advisory_lock($1)', [LOCK]);
    if ((await newestApplied(client)) > (await newestKnown()))
      throw Object.assign(
        new Error('The database was written by a newer version of Fettle; update the code first.'),
        {
          code: 'NEWER_SCHEMA',
        },
      );
    await migrate(drizzle(client), { migrationsFolder: folder });
  } finally {
    await client.end();
  }
}
