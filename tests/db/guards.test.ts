import { sql } from 'drizzle-orm';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { closeDatabase, database } from '../../db/client';
import { withScope } from '../../db/tx';
import { aChange, anOrganisation, type Organisation } from '../support/factories';

afterAll(closeDatabase);

const KEPT = {
  gain_sets: 'reason',
  change_events: 'remark',
  field_reports: 'remark',
  audit_events: 'actor_name',
};

describe('what is kept', () => {
  let organisation: Organisation;
  let changeId: string;

  beforeAll(async () => {
    organisation = await anOrganisation();
    ({ id: changeId } = await aChange(organisation, 'verified'));
  });

  const own = () => sql`where org_id = ${organisation.orgId}`;

  it.each(Object.entries(KEPT))(
    'in %s is never changed, removed or emptied by the owner',
    async (table, column) => {
      const name = sql.identifier(table);
      const refused = { cause: { message: /never changed or removed/ } };
      for (const statement of [
        sql`update ${name} set ${sql.identifier(column)} = 'another' ${own()}`,
        sql`delete from ${name} ${own()}`,
        sql`truncate ${name} cascade`,
      ])
        await expect(database().execute(statement)).rejects.toMatchObject(refused);
    },
  );

  it.each(Object.entries(KEPT))('in %s is not within reach of a request', async (table, column) => {
    const name = sql.identifier(table);
    const { admin } = organisation.scopes;
    for (const statement of [
      sql`update ${name} set ${sql.identifier(column)} = 'another'`,
      sql`delete from ${name}`,
      sql`truncate ${name}`,
    ])
      await expect(withScope(admin, (tx) => tx.execute(statement))).rejects.toMatchObject({
        cause: { message: /permission denied/ },
      });
  });

  it.each(['reason', 'risk', 'test', 'way_back', 'site_reference', 'content_hash'])(
    'under a signature as %s of a change stands',
    async (column) => {
      await expect(
        database().execute(
          sql`update changes set ${sql.identifier(column)} = 'another' where id = ${changeId}`,
        ),
      ).rejects.toMatchObject({ cause: { message: /submitted change is never changed/ } });
    },
  );

  it('as number and author of a change stands even in a draft, and no change is removed', async () => {
    const { id } = await aChange(organisation, 'draft');
    const one = sql`where id = ${id}`;
    for (const statement of [
      sql`update changes set number = 99 ${one}`,
      sql`update changes set author_name = 'Somebody Else' ${one}`,
      sql`delete from changes ${one}`,
    ])
      await expect(database().execute(statement)).rejects.toMatchObject({
        cause: { message: /never changed/ },
      });
    await database().execute(sql`update changes set risk = 'thought over again' ${one}`);
  });

  it('puts no version of another axis into service or into a change', async () => {
    const first = await aChange(organisation, 'draft');
    const second = await aChange(organisation, 'draft');
    const foreign = second.axis.gainSetIds[0];
    await expect(
      database().execute(
        sql`update axes set in_service_gain_set_id = ${foreign} where id = ${first.axis.axisId}`,
      ),
    ).rejects.toMatchObject({ cause: { message: /axes_in_service/ } });
    await expect(
      database().execute(sql`update changes set from_gain_set_id = ${foreign} where id = ${first.id}`),
    ).rejects.toMatchObject({ cause: { message: /changes_from/ } });
  });
});
