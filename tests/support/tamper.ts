import { sql, type SQL } from 'drizzle-orm';
import { database } from '../../db/client';

/** Does what only someone with all rights on the server could: switches the guards off and writes over a record. */
export async function tamperWith(statement: SQL): Promise<void> {
  await database().transaction(async (tx) => {
    await tx.execute(sql`set local session_replication_role = replica`);
    await tx.execute(statement);
  });
}
