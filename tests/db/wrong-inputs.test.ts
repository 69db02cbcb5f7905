import { sql } from 'drizzle-orm';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { closeDatabase, database } from '../../db/client';
import { FettleError } from '../../lib/errors';
import { createAxis } from '../../lib/services/axes/create-axis';
import { updateAxis } from '../../lib/services/axes/update-axis';
import { applyChange } from '../../lib/services/changes/apply-change';
import { createChange } from '../../lib/services/changes/create-change';
import { issueChange } from '../../lib/services/changes/issue-change';
import { returnChange } from '../../lib/services/changes/return-change';
import { rollBackChange } from '../../lib/services/changes/roll-back-change';
import { updateChange } from '../../lib/services/changes/update-change';
import { verifyChange } from '../../lib/services/changes/verify-change';
import { withdrawChange } from '../../lib/services/changes/withdraw-change';
import { keepGainSet } from '../../lib/services/gain-sets/keep-gain-set';
import { createMachine } from '../../lib/services/machines/create-machine';
import { updateMachine } from '../../lib/services/machines/update-machine';
import { createToken } from '../../lib/services/tokens/create-token';
import { aChange, anOrganisation, AXIS_FIELDS, keepInput, type Organisation } from '../support/factories';

afterAll(closeDatabase);

/** Texts that a program may send and that no record can hold. */
const BAD_TEXTS = ['a\u0000b', 'half \ud800', '\u0007', '\u202Eabc'];
const TABLES = [
  'machines',
  'axes',
  'load_cases',
  'gain_sets',
  'changes',
  'change_events',
  'field_reports',
  'api_tokens',
  'outbox_messages',
];

async function rowsOf(orgId: string): Promise<Record<string, unknown>> {
  const counts: Record<string, unknown> = {};
  for (const table of TABLES) {
    const rows = await database().execute(
      sql`select md5(string_agg(t::text, '|' order by t::text)) as sum from ${sql.identifier(table)} t where org_id = ${orgId}`,
    );
    counts[table] = rows.rows[0].sum;
  }
  return counts;
}

describe('an input that is wrong', () => {
  let organisation: Organisation;
  let axisId: string;
  let machineId: string;
  const changeIn: Record<string, string> = {};

  beforeAll(async () => {
    organisation = await anOrganisation();
    const { scopes } = organisation;
    ({ id: machineId } = await createMachine(scopes.engineer, { site: 'Hall', name: 'M' }));
    for (const state of ['draft', 'submitted', 'approved', 'issued', 'applied'] as const) {
      const { id, axis } = await aChange(organisation, state);
      changeIn[state] = id;
      axisId = axis.axisId;
    }
  });

  const values = { p: 2, i: 9, d: 0 };
  const content = { reason: 'r', safetyFunction: 'no' };
  const entered = {
    cautionsAcknowledged: true,
    identity: { deviceLabel: 'A1' },
    asFound: values,
    asLeft: values,
    saved: 'yes',
  };

  /** Every verb with one input of its own that would do but for one text or number in it. */
  const verbs: Record<
    string,
    { texts: (bad: string) => unknown[]; call: (input: unknown) => Promise<unknown> }
  > = {
    createMachine: {
      texts: (bad) => [
        { site: bad, name: 'n' },
        { site: 's', name: bad },
        { site: 's', name: 'n', cautions: bad },
      ],
      call: (input) => createMachine(organisation.scopes.engineer, input),
    },
    updateMachine: {
      texts: (bad) => [
        { site: bad, name: 'n', rowVersion: 1 },
        { site: 's', name: 'n', rowVersion: 4e9 },
      ],
      call: (input) => updateMachine(organisation.scopes.engineer, machineId, input),
    },
    createAxis: {
      texts: (bad) =>
        ['tag', 'name', 'measurementUnit', 'outputUnit', 'deviceLabel', 'machineId'].map((key) => ({
          ...AXIS_FIELDS,
          tag: 'NEW-1',
          machineId,
          [key]: bad,
        })),
      call: (input) => createAxis(organisation.scopes.engineer, input),
    },
    updateAxis: {
      texts: (bad) => [
        { ...AXIS_FIELDS, rowVersion: 1, tag: bad },
        { ...AXIS_FIELDS, rowVersion: 4e9 },
        { ...AXIS_FIELDS, rowVersion: 1, sampleTimeS: Infinity },
      ],
      call: (input) => updateAxis(organisation.scopes.engineer, axisId, input),
    },
    keepGainSet: {
      texts: (bad) => [
        keepInput(2, bad),
        { ...keepInput(), rule: bad },
        { ...keepInput(), settings: { type: bad } },
        { ...keepInput(), settings: { [bad]: 1 } },
        { ...keepInput(), plant: { text: `1/(s+1)${bad}` } },
        { ...keepInput(), plant: undefined, loadCases: [{ name: bad, plant: keepInput().plant }] },
        { ...keepInput(), requirement: { msMax: 1e300 } },
        { ...keepInput(), controller: { kp: 2, ti: 1e-300 } },
      ],
      call: (input) => keepGainSet(organisation.scopes.engineer, axisId, input),
    },
    createChange: {
      texts: (bad) =>
        ['reason', 'risk', 'test', 'wayBack', 'siteReference', 'axisId', 'gainSetId'].map((key) => ({
          ...content,
          axisId,
          gainSetId: axisId,
          [key]: bad,
        })),
      call: (input) => createChange(organisation.scopes.engineer, input),
    },
    updateChange: {
      texts: (bad) => [
        { ...content, rowVersion: 1, reason: bad },
        { ...content, rowVersion: 4e9 },
        { ...content, rowVersion: 1, temporaryUntil: '0000-01-01T00:00:00Z' },
      ],
      call: (input) => updateChange(organisation.scopes.engineer, changeIn.draft, input),
    },
    withdrawChange: {
      texts: (bad) => [{ remark: bad }],
      call: (input) => withdrawChange(organisation.scopes.engineer, changeIn.draft, input),
    },
    returnChange: {
      texts: (bad) => [{ remark: bad }],
      call: (input) => returnChange(organisation.scopes.approver, changeIn.submitted, input),
    },
    issueChange: {
      texts: (bad) => [{ technicianId: bad }],
      call: (input) => issueChange(organisation.scopes.engineer, changeIn.approved, input),
    },
    applyChange: {
      texts: (bad) => [
        { ...entered, identity: { deviceLabel: bad } },
        { ...entered, identity: { deviceLabel: 'A1', slot: bad } },
        { ...entered, asFound: { ...values, [bad]: 1 } },
        { ...entered, asLeft: { ...values, [bad]: 1 } },
        { ...entered, asFoundRemark: bad },
        { ...entered, remark: bad },
        { ...entered, enteredAt: bad },
      ],
      call: (input) => applyChange(organisation.scopes.technician, changeIn.issued, input),
    },
    verifyChange: {
      texts: (bad) => [{ result: 'fail', remark: bad }],
      call: (input) => verifyChange(organisation.scopes.technician, changeIn.applied, input),
    },
    rollBackChange: {
      texts: (bad) => [
        { reason: bad, asLeft: values },
        { reason: 'r', asLeft: { ...values, [bad]: 1 } },
      ],
      call: (input) => rollBackChange(organisation.scopes.technician, changeIn.applied, input),
    },
    createToken: {
      texts: (bad) => [
        { name: bad, role: 'engineer', days: 1 },
        { name: 'n', role: bad, days: 1 },
        { name: 'n', role: 'engineer', days: 4e9 },
      ],
      call: (input) => createToken(organisation.scopes.engineer, input),
    },
  };

  const NOT_INPUTS = [undefined, null, 7, 'text', [], {}, { reason: 1 }, new Date()];

  it.each(Object.keys(verbs))('%s refuses it with a sentence, and writes nothing', async (name) => {
    const { texts, call } = verbs[name];
    const before = await rowsOf(organisation.orgId);
    for (const input of [...BAD_TEXTS.flatMap(texts), ...NOT_INPUTS]) {
      if (name === 'issueChange' && isNoWish(input)) continue;
      const error: unknown = await call(input).then(
        () => new Error(`${JSON.stringify(input)} was taken`),
        (reason: unknown) => reason,
      );
      expect(error, JSON.stringify(input)).toBeInstanceOf(FettleError);
      expect((error as FettleError).message).toMatch(/[.?!]$/);
    }
    expect(await rowsOf(organisation.orgId)).toEqual(before);
  });

  /** To issue to any technician nothing need be said. */
  function isNoWish(input: unknown): boolean {
    return typeof input === 'object' && input !== null && !Array.isArray(input) && !('technicianId' in input);
  }
});
