import { drizzle, type NodePgDatabase } from 'drizzle-orm/node-postgres';
import { Pool } from 'pg';
import { environment } from '../lib/env';
import { log } from '../lib/log';
import * as schema from './schema';

export type Database = NodePgDatabase<typeof schema>;
export type Transaction = Parameters<Parameters<Database['transaction']>[0]>[0];

// One pool for the process, also across the module copies that a development server makes.
const held = globalThis as { fettlePool?: Pool };

function openPool(): Pool {
  const pool = new Pool({
    connectionString: environment().DATABASE_URL,
    max: 10,
    // Whoever waits longer than this for the database is told so.
    connectionTimeoutMillis: 10_000,
  });
  // A server that restarts drops idle connections; the pool opens new ones, and the process must outlive it.
  pool.on('error', (error) => log.warn({ err: error }, 'an idle connection to the database was lost'));
  return pool;
}

export function pool(): Pool {
  held.fettlePool ??= openPool();
  return held.fettlePool;
}

export function database(): Database {
  return drizzle(pool(), { schema });
}

export async function closeDatabase(): Promise<void> {
  await held.fettlePool?.end();
  held.fettlePool = undefined;
}
