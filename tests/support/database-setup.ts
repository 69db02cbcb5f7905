import { migrateDatabase } from '../../db/migrate';

/** Before the database suite: the fresh database that the runner made gets its tables. */
export default async function setUp(): Promise<void> {
  const url = process.env.DATABASE_URL;
  if (!url) throw new Error('The database suite needs DATABASE_URL; run it with `npm test -- db`.');
  await migrateDatabase(url);
}
