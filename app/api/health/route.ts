import { databaseAnswers } from '@/db/queries/health';

export const dynamic = 'force-dynamic';

/** Says whether the server reaches its database. */
export async function GET() {
  if (await databaseAnswers()) return Response.json({ ok: true });
  return Response.json({ ok: false, detail: 'The database does not answer.' }, { status: 503 });
}
