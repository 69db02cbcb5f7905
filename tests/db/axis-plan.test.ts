import { afterAll, describe, expect, it } from 'vitest';
import { closeDatabase } from '../../db/client';
import { getAxis } from '../../db/queries/axes';
import { withScope } from '../../db/tx';
import { saveLoadCases } from '../../lib/services/axes/save-load-cases';
import { saveRequirement } from '../../lib/services/axes/save-requirement';
import { updateAxis } from '../../lib/services/axes/update-axis';
import { keepGainSet } from '../../lib/services/gain-sets/keep-gain-set';
import { anAxis, anOrganisation, AXIS_FIELDS, keepInput } from '../support/factories';

afterAll(closeDatabase);

const CASES = [
  { name: 'empty', plant: { text: 'K=1 tau=10 theta=1' } },
  { name: 'full', plant: { num: [0.8], den: [12, 1], delay: 1 } },
];

async function anAxisToPlan() {
  const organisation = await anOrganisation();
  const id = await anAxis(organisation);
  const { engineer } = organisation.scopes;
  const axis = async () => {
    const found = await withScope(engineer, (tx) => getAxis(tx, engineer, { id }));
    if (!found) throw new Error('the axis is gone');
    return found;
  };
  return { organisation, engineer, id, axis };
}

describe('an axis', () => {
  it('takes load cases and limits before any version is kept', async () => {
    const { engineer, id, axis } = await anAxisToPlan();
    await saveLoadCases(engineer, id, { loadCases: CASES, rowVersion: 1 });
    await saveRequirement(engineer, id, { requirement: { msMax: 1.8 }, rowVersion: 2 });
    const { loadCases, requirement, lastVersion, rowVersion } = await axis();
    expect(loadCases.map(({ name, plant }) => [name, plant?.deadTimeS])).toEqual([
      ['empty', 1],
      ['full', 1],
    ]);
    expect([requirement, lastVersion, rowVersion]).toEqual([{ msMax: 1.8 }, 0, 3]);
    await saveLoadCases(engineer, id, { loadCases: CASES.slice(1), rowVersion: 3 });
    expect((await axis()).loadCases.map(({ name }) => name)).toEqual(['full']);
  });

  it('is edited by one of two people who started from the same state', async () => {
    const { organisation, engineer, id, axis } = await anAxisToPlan();
    const { colleague } = organisation.scopes;
    const outcomes = await Promise.allSettled([
      saveRequirement(engineer, id, { requirement: { msMax: 1.8 }, rowVersion: 1 }),
      saveRequirement(colleague, id, { requirement: { msMax: 1.4 }, rowVersion: 1 }),
      saveLoadCases(colleague, id, { loadCases: CASES, rowVersion: 1 }),
      updateAxis(engineer, id, { ...AXIS_FIELDS, name: 'Another', rowVersion: 1 }),
    ]);
    expect(outcomes.filter(({ status }) => status === 'fulfilled')).toHaveLength(1);
    expect((await axis()).rowVersion).toBe(2);
  });

  it('keeps no version whose form the axis no longer has', async () => {
    const { engineer, id, axis } = await anAxisToPlan();
    const convention = { ...AXIS_FIELDS.convention, form: 'parallel', integral: 'gain', derivative: 'gain' };
    const outcomes = await Promise.allSettled([
      keepGainSet(engineer, id, keepInput()),
      updateAxis(engineer, id, { ...AXIS_FIELDS, convention, rowVersion: 1 }),
    ]);
    // The check takes longer than the edit: the version is refused, and no number is used up.
    expect(outcomes[1].status).toBe('fulfilled');
    if (outcomes[0].status === 'rejected') expect(outcomes[0].reason).toMatchObject({ code: 'CONFLICT' });
    const { version } = await keepGainSet(engineer, id, keepInput());
    expect(version).toBe(outcomes[0].status === 'fulfilled' ? 2 : 1);
    expect((await axis()).lastVersion).toBe(version);
  });

  it('takes plans from engineers alone, and none that can’t be', async () => {
    const { organisation, engineer, id, axis } = await anAxisToPlan();
    const { technician, approver, admin } = organisation.scopes;
    for (const scope of [technician, approver, admin]) {
      const refused = { code: 'FORBIDDEN' };
      await expect(saveRequirement(scope, id, { requirement: {}, rowVersion: 1 })).rejects.toMatchObject(
        refused,
      );
      await expect(saveLoadCases(scope, id, { loadCases: CASES, rowVersion: 1 })).rejects.toMatchObject(
        refused,
      );
    }
    const stranger = (await anOrganisation()).scopes.engineer;
    await expect(saveLoadCases(stranger, id, { loadCases: CASES, rowVersion: 1 })).rejects.toMatchObject({
      code: 'NOT_FOUND',
    });
    await expect(
      saveLoadCases(engineer, id, { loadCases: [CASES[0], CASES[0]], rowVersion: 1 }),
    ).rejects.toMatchObject({ code: 'MALFORMED' });
    await expect(
      saveLoadCases(engineer, id, {
        loadCases: [{ name: 'x', plant: { text: 's^2/(s+1)' } }],
        rowVersion: 1,
      }),
    ).rejects.toMatchObject({ code: 'INVALID' });
    await expect(
      saveRequirement(engineer, id, { requirement: { msMax: -1 }, rowVersion: 1 }),
    ).rejects.toMatchObject({ code: 'MALFORMED' });
    expect((await axis()).rowVersion).toBe(1);
  });
});
