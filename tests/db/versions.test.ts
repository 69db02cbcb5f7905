import { eq, sql } from 'drizzle-orm';
import { afterAll, describe, expect, it } from 'vitest';
import { closeDatabase, database } from '../../db/client';
import { getAxis } from '../../db/queries/axes';
import { listGainSets } from '../../db/queries/gain-sets';
import { axes, gainSets } from '../../db/schema';
import { withScope } from '../../db/tx';
import { keepGainSet } from '../../lib/services/gain-sets/keep-gain-set';
import { anAxis, anOrganisation, keepInput } from '../support/factories';

afterAll(closeDatabase);

describe('keeping versions', () => {
  it('numbers without a gap and without a double when two people keep at once, 50 times', async () => {
    const organisation = await anOrganisation();
    const axisId = await anAxis(organisation);
    const { engineer, colleague } = organisation.scopes;
    for (let round = 0; round < 25; round += 1)
      await Promise.all([
        keepGainSet(engineer, axisId, keepInput()),
        keepGainSet(colleague, axisId, keepInput(2.5)),
      ]);
    const rows = await withScope(engineer, (tx) => listGainSets(tx, engineer, { axisId, limit: 100 }));
    expect(rows.map(({ version }) => version)).toEqual(Array.from({ length: 50 }, (_, i) => 50 - i));
  });

  it('leaves no gap behind a keep that fails in its transaction', async () => {
    const organisation = await anOrganisation();
    const axisId = await anAxis(organisation);
    const { engineer } = organisation.scopes;
    await expect(
      withScope(engineer, async (tx) => {
        await tx
          .update(axes)
          .set({ lastVersion: sql`${axes.lastVersion} + 1` })
          .where(eq(axes.id, axisId));
        throw new Error('a failure half way');
      }),
    ).rejects.toThrow('half way');
    expect((await keepGainSet(engineer, axisId, keepInput())).version).toBe(1);
  });

  it('computes the check itself, with two engines that agree, and never believes the client', async () => {
    const organisation = await anOrganisation();
    const axisId = await anAxis(organisation);
    const { engineer } = organisation.scopes;
    const { checks } = await keepGainSet(engineer, axisId, { ...keepInput(), check: { stable: false } });
    const { check } = checks.checks[0];
    expect(check.engines?.engines).toEqual(['exact', 'ode']);
    expect(check.engines?.agreement).toBeLessThan(1e-4);
    expect(check.stable).toBe(true);
  });

  it('keeps load cases and requirement as the axis opens with them next time', async () => {
    const organisation = await anOrganisation();
    const axisId = await anAxis(organisation);
    const { engineer } = organisation.scopes;
    await keepGainSet(engineer, axisId, {
      loadCases: [
        { name: 'empty', plant: { text: 'K=1 tau=10 theta=1' } },
        { name: 'full', plant: { num: [0.8], den: [12, 1], delay: 1 } },
      ],
      controller: { kp: 2, ti: 9 },
      requirement: { msMax: 1.8 },
      reason: 'two operating points',
    });
    const axis = await withScope(engineer, (tx) => getAxis(tx, engineer, { id: axisId }));
    expect(axis?.loadCases.map(({ name, plant }) => [name, plant?.text])).toEqual([
      ['empty', 'K=1 tau=10 theta=1'],
      ['full', '[0.8] / [12 1], delay 1'],
    ]);
    expect(axis?.requirement).toEqual({ msMax: 1.8 });
  });

  it('refuses an unstable loop, an improper plant and a missing reason, and writes nothing', async () => {
    const organisation = await anOrganisation();
    const axisId = await anAxis(organisation);
    const { engineer } = organisation.scopes;
    const wrong = [
      { ...keepInput(40) },
      { ...keepInput(), plant: { text: 's^2/(s+1)' } },
      { ...keepInput(), reason: '  ' },
      { ...keepInput(), controller: { kp: 'two' } },
      { ...keepInput(), controller: { kp: 1e308, ti: 1e-300 } },
      { ...keepInput(), controller: { kp: 2, ti: -1 } },
      { ...keepInput(), plant: undefined },
    ];
    for (const input of wrong) await expect(keepGainSet(engineer, axisId, input)).rejects.toThrow();
    const rows = await withScope(engineer, (tx) => listGainSets(tx, engineer, { axisId, limit: 100 }));
    expect(rows).toEqual([]);
  });

  it('never changes or removes what is kept, not even for the owner of the tables', async () => {
    const organisation = await anOrganisation();
    const axisId = await anAxis(organisation);
    const { id } = await keepGainSet(organisation.scopes.engineer, axisId, keepInput());
    const refusals = [
      database().update(gainSets).set({ reason: 'another' }).where(eq(gainSets.id, id)),
      database().delete(gainSets).where(eq(gainSets.id, id)),
      database().execute(sql`truncate gain_sets cascade`),
    ];
    for (const refusal of refusals)
      await expect(refusal).rejects.toMatchObject({ cause: { message: /never changed or removed/ } });
  });
});
