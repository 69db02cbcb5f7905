import { sql } from 'drizzle-orm';
import { withSystem } from '@/db/tx';

export const dynamic = 'force-dynamic';

/** Says whether the server reaches its database. */
export async function GET() {
  try {
    await withSystem((tx) => tx.execute(sql`select 1`));
    return Response.json({ ok: true });
  } catch {
    return Response.json({ ok: false, detail: 'The database does not answer.' }, { status: 503 });
  }
}
