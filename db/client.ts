import { drizzle, type NodePgDatabase } from 'drizzle-orm/node-postgres';
import { Pool } from 'pg';
import { environment } from '../lib/env';
import * as schema from './schema';

export type Database = NodePgDatabase<typeof schema>;
export type Transaction = Parameters<Parameters<Database['transaction']>[0]>[0];

// One pool for the process, also across the module copies that a development server makes.
const held = globalThis as { fettlePool?: Pool };

export function pool(): Pool {
  held.fettlePool ??= new Pool({ connectionString: environment().DATABASE_URL, max: 10 });
  return held.fettlePool;
}

export function database(): Database {
  return drizzle(pool(), { schema });
}

export async function closeDatabase(): Promise<void> {
  await held.fettlePool?.end();
  held.fettlePool = undefined;
}
