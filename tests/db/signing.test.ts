import { and, eq } from 'drizzle-orm';
import { afterAll, beforeEach, describe, expect, it } from 'vitest';
import { closeDatabase, database } from '../../db/client';
import { auditEvents, changes, memberships, outboxMessages, persons } from '../../db/schema';
import { verifyAudit, verifyChangeEvents } from '../../lib/audit/verify';
import { withScope } from '../../db/tx';
import { applyChange } from '../../lib/services/changes/apply-change';
import { approveChange } from '../../lib/services/changes/approve-change';
import { createChange } from '../../lib/services/changes/create-change';
import { issueChange } from '../../lib/services/changes/issue-change';
import { readChange } from '../../lib/services/changes/read-change';
import { returnChange } from '../../lib/services/changes/return-change';
import { rollBackChange } from '../../lib/services/changes/roll-back-change';
import { submitChange } from '../../lib/services/changes/submit-change';
import { updateChange } from '../../lib/services/changes/update-change';
import { withdrawChange } from '../../lib/services/changes/withdraw-change';
import { aChange, anOrganisation, PASSWORD, type Organisation } from '../support/factories';

afterAll(closeDatabase);

const sign = { password: PASSWORD };
const words = { reason: 'a test', safetyFunction: 'no' };
const values = { p: 2, i: 9, d: 0 };
const entered = {
  cautionsAcknowledged: true,
  identity: { deviceLabel: 'A1' },
  asFound: values,
  asLeft: values,
  saved: 'yes',
};

let organisation: Organisation;
beforeEach(async () => {
  organisation = await anOrganisation();
});

const letters = () =>
  database().select().from(outboxMessages).where(eq(outboxMessages.orgId, organisation.orgId));

describe('a signature', () => {
  it('asks for the role before the password: who may not sign learns nothing about it', async () => {
    const { id } = await aChange(organisation, 'submitted');
    const { technician } = organisation.scopes;
    await expect(approveChange(technician, id, { password: 'wrong' })).rejects.toMatchObject({
      code: 'FORBIDDEN',
      message: expect.stringContaining('approver'),
    });
  });

  it('is no place to try passwords: wrong ones count as wrong sign-ins do', async () => {
    const { id } = await aChange(organisation, 'submitted');
    const { approver } = organisation.scopes;
    for (let i = 0; i < 10; i += 1)
      await expect(approveChange(approver, id, { password: `guess ${i}` })).rejects.toMatchObject({
        code: 'FORBIDDEN',
      });
    await expect(approveChange(approver, id, sign)).rejects.toMatchObject({ code: 'TOO_MANY' });
    expect((await readChange(approver, id)).change.state).toBe('submitted');
  });

  it('stands for the content that was read, and for no other', async () => {
    const { id } = await aChange(organisation, 'submitted');
    const { engineer, approver } = organisation.scopes;
    const read = (await readChange(approver, id)).change.contentHash;
    await returnChange(approver, id, { remark: 'say more about the risk' });
    const { rowVersion } = (await readChange(engineer, id)).change;
    await updateChange(engineer, id, { ...words, risk: 'none', rowVersion });
    await submitChange(engineer, id);
    await expect(approveChange(approver, id, { ...sign, hash: read })).rejects.toMatchObject({
      code: 'CONFLICT',
    });
    const { contentHash } = (await readChange(approver, id)).change;
    await approveChange(approver, id, { ...sign, hash: contentHash });
    const { events } = await readChange(approver, id);
    expect(events.at(-1)).toMatchObject({ action: 'approve', contentHash, byRole: 'approver' });
    expect(await withScope(approver, (tx) => verifyChangeEvents(tx, approver, id))).toMatchObject({
      intact: true,
    });
  });
});

describe('a refused step', () => {
  it('leaves a line in the audit log and nothing else, whatever refused it', async () => {
    const { id } = await aChange(organisation, 'submitted');
    const { engineer, colleague, technician, approver } = organisation.scopes;
    const before = (await letters()).length;
    const { rowVersion } = (await readChange(engineer, id)).change;
    const attempts: [string, () => Promise<unknown>, string][] = [
      ['change.edit', () => updateChange(engineer, id, { ...words, rowVersion }), 'CONFLICT'],
      ['change.edit', () => updateChange(technician, id, { ...words, rowVersion }), 'FORBIDDEN'],
      ['change.submit', () => submitChange(engineer, id), 'CONFLICT'],
      ['change.issue', () => issueChange(approver, id, {}), 'CONFLICT'],
      ['change.apply', () => applyChange(technician, id, entered), 'CONFLICT'],
      ['change.withdraw', () => withdrawChange(colleague, id, { remark: 'mine?' }), 'FORBIDDEN'],
      ['change.return', () => returnChange(engineer, id, { remark: 'to myself' }), 'FORBIDDEN'],
    ];
    for (const [, attempt, code] of attempts) await expect(attempt()).rejects.toMatchObject({ code });
    const rows = await database()
      .select({ action: auditEvents.action })
      .from(auditEvents)
      .where(and(eq(auditEvents.orgId, organisation.orgId), eq(auditEvents.subjectId, id)));
    const refused = rows.map(({ action }) => action).filter((action) => action.endsWith('.refused'));
    expect(refused.sort()).toEqual(attempts.map(([action]) => `${action}.refused`).sort());
    expect((await readChange(engineer, id)).events).toHaveLength(2);
    expect(await letters()).toHaveLength(before);
    expect(await withScope(engineer, (tx) => verifyAudit(tx, engineer))).toMatchObject({ intact: true });
  });

  it('of a stranger is answered as if there were nothing, and not recorded', async () => {
    const { id } = await aChange(organisation, 'submitted');
    const stranger = (await anOrganisation()).scopes.approver;
    await expect(approveChange(stranger, id, { password: 'wrong' })).rejects.toMatchObject({
      code: 'NOT_FOUND',
    });
    const rows = await database().select().from(auditEvents).where(eq(auditEvents.orgId, stranger.orgId));
    expect(rows.filter(({ action }) => action.includes('refused'))).toEqual([]);
  });
});

describe('numbers and baselines', () => {
  it('numbers the changes of an organisation without a gap, though two people draft at once', async () => {
    const { axis } = await aChange(organisation, 'draft');
    const { engineer, colleague } = organisation.scopes;
    const draft = { axisId: axis.axisId, gainSetId: axis.gainSetIds[1], ...words };
    const wrong = { ...draft, gainSetId: axis.axisId };
    await Promise.allSettled(
      Array.from({ length: 12 }, (_, index) => [
        createChange(index % 2 ? engineer : colleague, draft),
        createChange(engineer, wrong),
      ]).flat(),
    );
    const rows = await database()
      .select({ number: changes.number })
      .from(changes)
      .where(eq(changes.orgId, organisation.orgId));
    expect(rows.map(({ number }) => number).sort((a, b) => a - b)).toEqual(
      Array.from({ length: 13 }, (_, index) => index + 1),
    );
  });

  it('lets one of two changes of an axis into service, and stops the other at its stale baseline', async () => {
    const { id, axis } = await aChange(organisation, 'issued');
    const { engineer, approver, technician } = organisation.scopes;
    const second = await createChange(engineer, {
      axisId: axis.axisId,
      gainSetId: axis.gainSetIds[1],
      ...words,
    });
    await submitChange(engineer, second.id);
    await approveChange(approver, second.id, sign);
    await issueChange(approver, second.id, {});
    const other = { ...entered, asLeft: { ...values, p: 3 } };
    const outcomes = await Promise.allSettled([
      applyChange(technician, id, entered),
      applyChange(technician, second.id, other),
    ]);
    expect(outcomes.map(({ status }) => status).sort()).toEqual(['fulfilled', 'rejected']);
    const late = outcomes[0].status === 'fulfilled' ? second.id : id;
    await expect(applyChange(technician, late, late === id ? entered : other)).rejects.toMatchObject({
      code: 'CONFLICT',
    });
    await rollBackChange(technician, late, { reason: 'not entered', asLeft: values });
  });

  it('takes no end of a temporary change that is over', async () => {
    const { axis } = await aChange(organisation, 'draft');
    const { engineer } = organisation.scopes;
    const draft = { axisId: axis.axisId, gainSetId: axis.gainSetIds[1], ...words };
    await expect(
      createChange(engineer, { ...draft, temporaryUntil: '2020-01-01T00:00:00Z' }),
    ).rejects.toMatchObject({ code: 'INVALID', fields: [{ path: 'temporaryUntil' }] });
    const temporaryUntil = new Date(Date.now() + 86_400_000).toISOString();
    const { id } = await createChange(engineer, { ...draft, temporaryUntil });
    expect((await readChange(engineer, id)).change.temporaryUntil?.toISOString()).toBe(temporaryUntil);
  });

  it('issues to no technician who has left', async () => {
    const { id } = await aChange(organisation, 'approved');
    const { engineer, technician } = organisation.scopes;
    const technicianId = technician.actor.id ?? '';
    await database().update(persons).set({ deactivatedAt: new Date() }).where(eq(persons.id, technicianId));
    await expect(issueChange(engineer, id, { technicianId })).rejects.toMatchObject({ code: 'INVALID' });
    await database().update(persons).set({ deactivatedAt: null }).where(eq(persons.id, technicianId));
    await database()
      .update(memberships)
      .set({ roles: ['engineer'] })
      .where(eq(memberships.personId, technicianId));
    await expect(issueChange(engineer, id, { technicianId })).rejects.toMatchObject({ code: 'INVALID' });
  });
});

describe('the record of what was done at the machine', () => {
  it('keeps when it was written down beside when it arrived', async () => {
    const { id } = await aChange(organisation, 'issued');
    const { technician } = organisation.scopes;
    const enteredAt = new Date(Date.now() - 7_200_000).toISOString();
    await applyChange(technician, id, { ...entered, enteredAt });
    const [report] = (await readChange(technician, id)).reports;
    expect(report.enteredAt?.toISOString()).toBe(enteredAt);
    expect(report.receivedAt.getTime()).toBeGreaterThan(Date.parse(enteredAt) + 7_000_000);
  });

  it('is the same when a person writes what looks like an infinite number', async () => {
    const { id } = await aChange(organisation, 'issued');
    const { technician } = organisation.scopes;
    const remark = 'number:inf';
    await applyChange(technician, id, { ...entered, remark, identity: { deviceLabel: remark } });
    const { events, reports } = await readChange(technician, id);
    expect([events.at(-1)?.payload.remark, reports[0].identity?.deviceLabel]).toEqual([remark, remark]);
    expect(await withScope(technician, (tx) => verifyChangeEvents(tx, technician, id))).toMatchObject({
      intact: true,
    });
  });

  it('says what differs after a roll-back, and never refuses it for that', async () => {
    const first = await aChange(organisation, 'verified');
    const { engineer, approver, technician } = organisation.scopes;
    const { id } = await createChange(engineer, {
      axisId: first.axis.axisId,
      gainSetId: first.axis.gainSetIds[1],
      ...words,
    });
    await submitChange(engineer, id);
    await approveChange(approver, id, sign);
    await issueChange(approver, id, {});
    await applyChange(technician, id, { ...entered, asLeft: { ...values, p: 3 } });
    await rollBackChange(technician, id, { reason: 'swings', asLeft: { ...values, p: 2.2 } });
    const { events, axis } = await readChange(technician, id);
    expect(axis.inServiceGainSetId).toBe(first.axis.gainSetIds[0]);
    expect(events.at(-1)?.payload.asLeftDifferences).toEqual([expect.stringContaining('2.2')]);
  });

  it('takes "inf" for a term that is off where the device has no code for it', async () => {
    const { id } = await aChange(organisation, 'issued');
    const { technician } = organisation.scopes;
    await applyChange(technician, id, {
      ...entered,
      asFound: { p: 2, i: 'inf', d: 0 },
      asFoundRemark: 'never tuned',
    });
    const [report] = (await readChange(technician, id)).reports;
    expect(report.asFound?.i).toBe(Infinity);
  });
});
