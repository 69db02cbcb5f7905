import { eq } from 'drizzle-orm';
import { afterAll, describe, expect, it } from 'vitest';
import { closeDatabase } from '../../db/client';
import { getAxis } from '../../db/queries/axes';
import { getChange } from '../../db/queries/changes';
import { getGainSet } from '../../db/queries/gain-sets';
import { listMachinesWithAxes } from '../../db/queries/machines';
import { axes, changes, gainSets, machines, persons } from '../../db/schema';
import { withScope } from '../../db/tx';
import { updateAxis } from '../../lib/services/axes/update-axis';
import { approveChange } from '../../lib/services/changes/approve-change';
import { createChange } from '../../lib/services/changes/create-change';
import { readChange } from '../../lib/services/changes/read-change';
import { keepGainSet } from '../../lib/services/gain-sets/keep-gain-set';
import { updateMachine } from '../../lib/services/machines/update-machine';
import { aChange, anOrganisation, AXIS_FIELDS, keepInput, PASSWORD } from '../support/factories';

afterAll(closeDatabase);

describe('two organisations', () => {
  it('see nothing of each other, by query or by service', async () => {
    const ours = await anOrganisation();
    const theirs = await anOrganisation();
    const { id, axis } = await aChange(ours, 'submitted');
    const { engineer, approver } = theirs.scopes;
    const [machine] = await withScope(ours.scopes.engineer, (tx) =>
      listMachinesWithAxes(tx, ours.scopes.engineer),
    );
    const notFound = { code: 'NOT_FOUND' };

    expect(await withScope(engineer, (tx) => getAxis(tx, engineer, { id: axis.axisId }))).toBeNull();
    expect(
      await withScope(engineer, (tx) => getGainSet(tx, engineer, { id: axis.gainSetIds[0] })),
    ).toBeNull();
    expect(await withScope(engineer, (tx) => getChange(tx, engineer, { id }))).toBeNull();
    expect(await withScope(engineer, (tx) => listMachinesWithAxes(tx, engineer))).toEqual([]);
    await expect(readChange(engineer, id)).rejects.toMatchObject(notFound);
    await expect(keepGainSet(engineer, axis.axisId, keepInput())).rejects.toMatchObject(notFound);
    await expect(updateAxis(engineer, axis.axisId, { ...AXIS_FIELDS, rowVersion: 1 })).rejects.toMatchObject(
      notFound,
    );
    await expect(
      updateMachine(engineer, machine.id, { site: 'x', name: 'y', rowVersion: 1 }),
    ).rejects.toMatchObject(notFound);
    await expect(approveChange(approver, id, { password: PASSWORD })).rejects.toMatchObject(notFound);
    await expect(
      createChange(engineer, {
        axisId: axis.axisId,
        gainSetId: axis.gainSetIds[0],
        reason: 'x',
        safetyFunction: 'no',
      }),
    ).rejects.toMatchObject(notFound);
  });

  it('are kept apart by the database itself when a query forgets the organisation', async () => {
    const ours = await anOrganisation();
    const theirs = await anOrganisation();
    const { id, axis } = await aChange(ours, 'draft');
    const { engineer } = theirs.scopes;
    await withScope(engineer, async (tx) => {
      expect(await tx.select().from(axes).where(eq(axes.id, axis.axisId))).toEqual([]);
      expect(await tx.select().from(changes).where(eq(changes.id, id))).toEqual([]);
      expect(await tx.select().from(gainSets).where(eq(gainSets.id, axis.gainSetIds[0]))).toEqual([]);
      expect(await tx.update(machines).set({ name: 'taken over' }).returning()).toEqual([]);
      const people = await tx.select({ email: persons.email }).from(persons);
      expect(people.map(({ email }) => email)).not.toContain(ours.emailOf('engineer'));
    });
    await expect(
      withScope(engineer, (tx) =>
        tx.insert(machines).values({ orgId: ours.orgId, site: 'x', name: 'smuggled' }),
      ),
    ).rejects.toMatchObject({ cause: { message: /row-level security/ } });
  });

  it('never hand a password hash to the role that requests run as', async () => {
    const { scopes } = await anOrganisation();
    await expect(
      withScope(scopes.engineer, (tx) => tx.select({ hash: persons.passwordHash }).from(persons)),
    ).rejects.toMatchObject({ cause: { message: /permission denied/ } });
  });
});
