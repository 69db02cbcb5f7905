import { sql } from 'drizzle-orm';
import type { Scope } from '../lib/auth/scope';
import { database, type Transaction } from './client';

/**
 * Runs work inside one transaction as the app's role, with row-level security set to the scope's organisation:
 * whatever a query forgets, the database shows and takes nothing of anyone else.
 */
export function withScope<T>(scope: Scope, work: (tx: Transaction) => Promise<T>): Promise<T> {
  return database().transaction(async (tx) => {
    await tx.execute(
      sql`select set_config('role', 'fettle_app', true), set_config('app.org_id', ${scope.orgId}, true)`,
    );
    return work(tx);
  });
}

/** Work before an organisation is known (sign-in, set-up) or for all of them (the mail worker, seeds). */
export function withSystem<T>(work: (tx: Transaction) => Promise<T>): Promise<T> {
  return database().transaction(work);
}
