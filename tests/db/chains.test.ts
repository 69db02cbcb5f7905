import { sql } from 'drizzle-orm';
import { afterAll, beforeEach, describe, expect, it } from 'vitest';
import { closeDatabase } from '../../db/client';
import { verifyAudit, verifyChangeEvents, verifyVersions } from '../../lib/audit/verify';
import { withScope } from '../../db/tx';
import { tamperWith } from '../support/tamper';
import { aChange, anOrganisation, type Organisation } from '../support/factories';

afterAll(closeDatabase);

describe('what was written', () => {
  let organisation: Organisation;
  let changeId: string;
  let axisId: string;

  beforeEach(async () => {
    organisation = await anOrganisation();
    const { id, axis } = await aChange(organisation, 'verified');
    changeId = id;
    ({ axisId } = axis);
  });

  const inScope = <T>(work: (tx: Parameters<typeof verifyAudit>[0]) => Promise<T>) =>
    withScope(organisation.scopes.engineer, work);
  const audit = () => inScope((tx) => verifyAudit(tx, organisation.scopes.engineer));
  const events = () => inScope((tx) => verifyChangeEvents(tx, organisation.scopes.engineer, changeId));
  const versions = () => inScope((tx) => verifyVersions(tx, organisation.scopes.engineer, axisId));
  const WHOLE = { intact: true, firstBroken: null, because: null };

  it('is found as it was written', async () => {
    expect(await audit()).toMatchObject(WHOLE);
    expect(await events()).toEqual({ ...WHOLE, length: 6 });
    expect(await versions()).toEqual({ ...WHOLE, length: 2 });
  });

  it.each([
    ['another name', 3, sql`update change_events set by_name = 'Somebody Else' where seq = 3`],
    ['another time', 2, sql`update change_events set at = at - interval '1 hour' where seq = 2`],
    ['another role', 4, sql`update change_events set by_role = 'admin' where seq = 4`],
    [
      'another value left',
      5,
      sql`update change_events set payload = jsonb_set(payload, '{asLeft,p}', '7') where seq = 5`,
    ],
    ['another remark', 6, sql`update change_events set remark = 'fine' where seq = 6`],
    ['one taken out', 3, sql`delete from change_events where seq = 2`],
    ['the last one taken out', 5, sql`delete from change_events where seq = 6`],
  ])('names the event of a change that was tampered with: %s', async (_what, firstBroken, tamper) => {
    await tamperWith(sql`${tamper} and org_id = ${organisation.orgId}`);
    expect(await events()).toMatchObject({ intact: false, firstBroken });
  });

  it.each([
    ['other words', sql`update changes set risk = 'none at all'`],
    ['another state', sql`update changes set state = 'withdrawn'`],
    ['words with their hash', sql`update changes set risk = 'none', content_hash = 'abc'`],
  ])('finds a change that is not what was signed: %s', async (_what, tamper) => {
    await tamperWith(sql`${tamper} where org_id = ${organisation.orgId}`);
    expect(await events()).toMatchObject({ intact: false, firstBroken: 6 });
  });

  it.each([
    ['another actor', 2, sql`update audit_events set actor_name = 'Nobody' where seq = 2`],
    ['another detail', 4, sql`update audit_events set detail = '{}' where seq = 4`],
    ['one taken out', 6, sql`delete from audit_events where seq = 5`],
    ['the hash made to fit alone', 3, sql`update audit_events set hash = 'abc' where seq = 3`],
  ])('names the line of the audit log: %s', async (_what, firstBroken, tamper) => {
    await tamperWith(sql`${tamper} and org_id = ${organisation.orgId}`);
    expect(await audit()).toMatchObject({ intact: false, firstBroken });
  });

  it('misses lines that were taken off the end of the audit log', async () => {
    const { length } = await audit();
    await tamperWith(
      sql`delete from audit_events where org_id = ${organisation.orgId} and seq > ${length - 2}`,
    );
    expect(await audit()).toMatchObject({ intact: false, firstBroken: length - 1 });
  });

  it.each([
    [
      'another gain',
      2,
      sql`update gain_sets set controller = jsonb_set(controller, '{kp}', '9') where version = 2`,
    ],
    [
      'a better verdict',
      1,
      sql`update gain_sets set verdict = jsonb_set(verdict, '{pass}', 'false') where version = 1`,
    ],
    ['another reason', 1, sql`update gain_sets set reason = 'better' where version = 1`],
  ])('names the version that is not as it was kept: %s', async (_what, firstBroken, tamper) => {
    await tamperWith(sql`${tamper} and org_id = ${organisation.orgId}`);
    expect(await versions()).toMatchObject({ intact: false, firstBroken });
  });
});
