import { sql } from 'drizzle-orm';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { closeDatabase, database } from '../../db/client';
import { withScope } from '../../db/tx';
import { createToken } from '../../lib/services/tokens/create-token';
import { aChange, anOrganisation, type Organisation } from '../support/factories';

afterAll(closeDatabase);

/** Tables that belong to no organisation, and that requests can't read at all. */
const CLOSED = ['sessions', 'rate_limits'];

async function tenantTables(): Promise<string[]> {
  const { rows } = await database().execute<{ name: string }>(sql`
    select c.relname as name from pg_class c join pg_attribute a on a.attrelid = c.oid
    where c.relkind = 'r' and c.relnamespace = 'public'::regnamespace and a.attname = 'org_id' order by 1`);
  return rows.map(({ name }) => name).filter((name) => !CLOSED.includes(name));
}

/** Counts without naming a column, since requests may not read every column. */
function count(table: string) {
  return sql`select count(*)::int as n from ${sql.identifier(table)}`;
}

describe('every table of an organisation', () => {
  let ours: Organisation;
  let theirs: Organisation;
  let tables: string[];

  beforeAll(async () => {
    ours = await anOrganisation();
    theirs = await anOrganisation();
    await aChange(ours, 'verified');
    await createToken(ours.scopes.engineer, { name: 'reports', role: 'engineer', days: 1 });
    tables = await tenantTables();
  });

  it('leads its keys with the organisation', async () => {
    const { rows } = await database().execute<{ name: string }>(sql`
      select c.relname as name from pg_index i join pg_class c on c.oid = i.indrelid
      join pg_attribute a on a.attrelid = c.oid and a.attnum = i.indkey[0]
      where i.indisprimary and a.attname = 'org_id' and c.relnamespace = 'public'::regnamespace`);
    expect(rows.map(({ name }) => name).sort()).toEqual(tables);
  });

  it('has row-level security with a policy', async () => {
    const { rows } = await database().execute<{ name: string }>(sql`
      select c.relname as name from pg_class c join pg_policy p on p.polrelid = c.oid
      where c.relrowsecurity and c.relnamespace = 'public'::regnamespace`);
    expect(rows.map(({ name }) => name)).toEqual(
      expect.arrayContaining([...tables, 'organisations', 'persons']),
    );
  });

  it('shows a request only what is of its own organisation', async () => {
    const { engineer } = ours.scopes;
    const stranger = theirs.scopes.engineer;
    const filled: string[] = [];
    for (const table of tables) {
      const { rows: seen } = await withScope(engineer, (tx) => tx.execute<{ n: number }>(count(table)));
      const { rows: own } = await database().execute<{ n: number }>(
        sql`${count(table)} where org_id = ${ours.orgId}`,
      );
      expect(seen[0].n, table).toBe(own[0].n);
      if (own[0].n > 0) filled.push(table);
      const { rows: strange } = await withScope(stranger, (tx) => tx.execute<{ n: number }>(count(table)));
      const { rows: theirOwn } = await database().execute<{ n: number }>(
        sql`${count(table)} where org_id = ${theirs.orgId}`,
      );
      expect(strange[0].n, table).toBe(theirOwn[0].n);
    }
    expect(filled).toEqual(
      expect.arrayContaining([
        'machines',
        'axes',
        'load_cases',
        'gain_sets',
        'changes',
        'change_events',
        'api_tokens',
      ]),
    );
  });

  it('shows nothing at all to a request without an organisation', async () => {
    for (const table of tables) {
      const seen = database().transaction(async (tx) => {
        await tx.execute(sql`set local role fettle_app`);
        return tx.execute<{ n: number }>(count(table));
      });
      expect((await seen).rows[0].n, table).toBe(0);
    }
  });

  it('belongs to another role than the one that requests run as, which has no way around', async () => {
    const { rows } = await database().execute<{ owned: number; strong: boolean }>(sql`
      select (select count(*)::int from pg_class where relowner = r.oid) as owned,
        r.rolsuper or r.rolbypassrls or r.rolcanlogin as strong
      from pg_roles r where r.rolname = 'fettle_app'`);
    expect(rows).toEqual([{ owned: 0, strong: false }]);
    for (const table of CLOSED)
      await expect(withScope(ours.scopes.admin, (tx) => tx.execute(count(table)))).rejects.toMatchObject({
        cause: { message: /permission denied/ },
      });
  });
});
