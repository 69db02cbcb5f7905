import { and, eq } from 'drizzle-orm';
import { afterAll, describe, expect, it } from 'vitest';
import { closeDatabase, database } from '../../db/client';
import { getAxis } from '../../db/queries/axes';
import { auditEvents, outboxMessages } from '../../db/schema';
import { withScope } from '../../db/tx';
import { applyChange } from '../../lib/services/changes/apply-change';
import { approveChange } from '../../lib/services/changes/approve-change';
import { createChange } from '../../lib/services/changes/create-change';
import { issueChange } from '../../lib/services/changes/issue-change';
import { readChange } from '../../lib/services/changes/read-change';
import { returnChange } from '../../lib/services/changes/return-change';
import { rollBackChange } from '../../lib/services/changes/roll-back-change';
import { submitChange } from '../../lib/services/changes/submit-change';
import { verifyChange } from '../../lib/services/changes/verify-change';
import { aChange, anOrganisation, PASSWORD } from '../support/factories';

afterAll(closeDatabase);

const sign = { password: PASSWORD };

function entries(asFound: Record<string, number>, asLeft: Record<string, number>) {
  return {
    cautionsAcknowledged: true,
    identity: { deviceLabel: 'A1' },
    asFound,
    asLeft,
    saved: 'yes',
  };
}

describe('the steps of a change', () => {
  it('go from draft to verified, and move the version in service', async () => {
    const organisation = await anOrganisation();
    const { id, axis } = await aChange(organisation, 'verified');
    const record = await readChange(organisation.scopes.engineer, id);
    expect(record.change.state).toBe('verified');
    expect(record.events.map(({ action }) => action)).toEqual([
      'draft',
      'submit',
      'approve',
      'issue',
      'apply',
      'verify',
    ]);
    expect(record.events[2].meaning).toMatch(/approve/);
    const { engineer } = organisation.scopes;
    const row = await withScope(engineer, (tx) => getAxis(tx, engineer, { id: axis.axisId }));
    expect(row?.inService?.version).toBe(1);
  });

  it('need another person to approve (four eyes), whatever roles the author has', async () => {
    const organisation = await anOrganisation();
    const { axis } = await aChange(organisation, 'draft');
    const { colleague, approver } = organisation.scopes;
    const own = await createChange(colleague, {
      axisId: axis.axisId,
      gainSetId: axis.gainSetIds[1],
      reason: 'own',
      safetyFunction: 'no',
    });
    await submitChange(colleague, own.id);
    await expect(approveChange(colleague, own.id, sign)).rejects.toMatchObject({ code: 'FORBIDDEN' });
    await approveChange(approver, own.id, sign);
    expect((await readChange(approver, own.id)).change.state).toBe('approved');
  });

  it('let the author approve in a one-person shop, and the record says so', async () => {
    const organisation = await anOrganisation(true);
    const { axis } = await aChange(organisation, 'draft');
    const { colleague } = organisation.scopes;
    const own = await createChange(colleague, {
      axisId: axis.axisId,
      gainSetId: axis.gainSetIds[1],
      reason: 'own',
      safetyFunction: 'no',
    });
    await submitChange(colleague, own.id);
    await approveChange(colleague, own.id, sign);
    const { events } = await readChange(colleague, own.id);
    expect(events.at(-1)?.payload).toMatchObject({ onePersonShop: true });
  });

  it('are refused to the wrong role and to a wrong password, and the attempt is in the audit log', async () => {
    const organisation = await anOrganisation();
    const { id } = await aChange(organisation, 'submitted');
    const { technician, engineer, approver, admin } = organisation.scopes;
    for (const scope of [technician, engineer, admin])
      await expect(approveChange(scope, id, sign)).rejects.toMatchObject({ code: 'FORBIDDEN' });
    await expect(approveChange(approver, id, { password: 'not mine' })).rejects.toMatchObject({
      code: 'FORBIDDEN',
    });
    expect((await readChange(engineer, id)).change.state).toBe('submitted');
    const refused = await withScope(engineer, (tx) =>
      tx
        .select({ who: auditEvents.actorName })
        .from(auditEvents)
        .where(and(eq(auditEvents.subjectId, id), eq(auditEvents.action, 'change.approve.refused'))),
    );
    expect(refused).toHaveLength(4);
  });

  it('are taken by one of two people who act at the same moment, and the other is told', async () => {
    const organisation = await anOrganisation();
    const { id } = await aChange(organisation, 'submitted');
    const { approver, colleague } = organisation.scopes;
    const outcomes = await Promise.allSettled([
      approveChange(approver, id, sign),
      returnChange(colleague, id, { remark: 'which load case?' }),
    ]);
    expect(outcomes.filter(({ status }) => status === 'fulfilled')).toHaveLength(1);
    const { events } = await readChange(approver, id);
    expect(events).toHaveLength(3);
  });

  it('stop a change of a safety function without the site’s own reference', async () => {
    const organisation = await anOrganisation();
    const { axis } = await aChange(organisation, 'draft');
    const { engineer, approver } = organisation.scopes;
    const { id } = await createChange(engineer, {
      axisId: axis.axisId,
      gainSetId: axis.gainSetIds[1],
      reason: 'not sure',
      safetyFunction: 'unknown',
    });
    await submitChange(engineer, id);
    await approveChange(approver, id, sign);
    await expect(issueChange(approver, id, {})).rejects.toMatchObject({ code: 'INVALID' });
  });
});

describe('at the machine', () => {
  it('as-left must be what was approved; a slip is named and nothing is written', async () => {
    const organisation = await anOrganisation();
    const { id } = await aChange(organisation, 'issued');
    const { technician } = organisation.scopes;
    const wrong = entries({ p: 2, i: 9, d: 0 }, { p: 2, i: 0.15, d: 0 });
    await expect(applyChange(technician, id, wrong)).rejects.toMatchObject({
      code: 'INVALID',
      fields: [{ path: 'asLeft.i' }],
    });
    const { change, reports } = await readChange(technician, id);
    expect([change.state, reports.length]).toEqual(['issued', 0]);
  });

  it('as-found that differs from what is in service needs a word, and is recorded', async () => {
    const organisation = await anOrganisation();
    const { axis } = await aChange(organisation, 'verified');
    const { engineer, approver, technician } = organisation.scopes;
    const { id } = await createChange(engineer, {
      axisId: axis.axisId,
      gainSetId: axis.gainSetIds[1],
      reason: 'second',
      safetyFunction: 'no',
    });
    await submitChange(engineer, id);
    await approveChange(approver, id, sign);
    await issueChange(engineer, id, {});
    const found = entries({ p: 2.8, i: 9, d: 0 }, { p: 3, i: 9, d: 0 });
    await expect(applyChange(technician, id, found)).rejects.toMatchObject({ code: 'INVALID' });
    await applyChange(technician, id, { ...found, asFoundRemark: 'Engineer asked: go on.' });
    const { events } = await readChange(technician, id);
    expect(events.at(-1)?.payload.asFoundDifferences).toEqual([expect.stringContaining('2.8')]);
  });

  it('is for the technician it was issued to, and only after the cautions', async () => {
    const organisation = await anOrganisation();
    const { id } = await aChange(organisation, 'approved');
    const { engineer, technician } = organisation.scopes;
    const values = { p: 2, i: 9, d: 0 };
    await expect(issueChange(engineer, id, { technicianId: engineer.actor.id })).rejects.toMatchObject({
      code: 'INVALID',
    });
    await issueChange(engineer, id, { technicianId: technician.actor.id });
    await expect(
      applyChange(technician, id, { ...entries(values, values), cautionsAcknowledged: false }),
    ).rejects.toMatchObject({ code: 'MALFORMED' });
    await applyChange(technician, id, entries(values, values));
    await expect(applyChange(technician, id, entries(values, values))).rejects.toMatchObject({
      code: 'CONFLICT',
    });
  });

  it('goes back: a roll-back puts the version before in service again', async () => {
    const organisation = await anOrganisation();
    const { id, axis } = await aChange(organisation, 'applied');
    const { technician } = organisation.scopes;
    await verifyChange(technician, id, { result: 'fail', remark: 'swings' });
    expect((await readChange(technician, id)).change.state).toBe('applied');
    await rollBackChange(technician, id, { reason: 'swings', asLeft: { p: 1, i: 9, d: 0 } });
    const row = await withScope(technician, (tx) => getAxis(tx, technician, { id: axis.axisId }));
    expect(row?.inService).toBeNull();
  });
});

describe('letters', () => {
  it('go to the outbox at each hand-off, to those whose turn it is', async () => {
    const organisation = await anOrganisation();
    await aChange(organisation, 'verified');
    const letters = await database()
      .select({ kind: outboxMessages.kind, to: outboxMessages.toEmail })
      .from(outboxMessages)
      .where(eq(outboxMessages.orgId, organisation.orgId));
    const to = (kind: string) =>
      letters
        .filter((letter) => letter.kind === kind)
        .map((letter) => letter.to)
        .sort();
    expect(to('change-submit')).toEqual([
      organisation.emailOf('approver'),
      organisation.emailOf('colleague'),
    ]);
    expect(to('change-issue')).toEqual([organisation.emailOf('technician')]);
    expect(to('change-approve')).toEqual([organisation.emailOf('engineer')]);
    expect(to('change-apply')).toContain(organisation.emailOf('engineer'));
  });
});
