import { sql } from 'drizzle-orm';
import { withSystem } from '../tx';

/** Whether the database answers a question that needs no table. */
export async function databaseAnswers(): Promise<boolean> {
  try {
    await withSystem((tx) => tx.execute(sql`select 1`));
    return true;
  } catch {
    return false;
  }
}
