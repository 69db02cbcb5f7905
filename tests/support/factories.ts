import { randomUUID } from 'node:crypto';
import { seedChange, type SeedCast, type SeedState } from '../../db/seed/changes';
import { seedOrganisation } from '../../db/seed/organisation';
import type { SeededAxis } from '../../db/seed/plant';
import { createAxis } from '../../lib/services/axes/create-axis';
import { keepGainSet } from '../../lib/services/gain-sets/keep-gain-set';
import { createMachine } from '../../lib/services/machines/create-machine';

export const PASSWORD = 'a password for tests';

/** An organisation of its own for one test, with an engineer, a second engineer, an approver, a technician and an admin. */
export async function anOrganisation(onePersonShop = false) {
  const mark = randomUUID().slice(0, 8);
  const person = (key: string, ...roles: ('engineer' | 'approver' | 'technician' | 'admin')[]) => ({
    key,
    name: `${key} ${mark}`,
    email: `${key}.${mark}@example.com`,
    roles,
  });
  const people = [
    person('engineer', 'engineer'),
    person('colleague', 'engineer', 'approver'),
    person('approver', 'approver'),
    person('technician', 'technician'),
    person('admin', 'admin'),
  ];
  const { orgId, scopes } = await seedOrganisation(`Organisation ${mark}`, people, PASSWORD, onePersonShop);
  const cast: SeedCast = {
    engineer: scopes.engineer,
    approver: scopes.approver,
    technician: scopes.technician,
    password: PASSWORD,
  };
  return { orgId, scopes, cast, emailOf: (key: string) => `${key}.${mark}@example.com` };
}

export type Organisation = Awaited<ReturnType<typeof anOrganisation>>;

export const AXIS_FIELDS = {
  tag: 'TC-1',
  name: 'Heater',
  measurementUnit: '°C',
  outputUnit: '%',
  convention: { form: 'ideal', gain: 'gain', integral: 'seconds', derivative: 'seconds' },
};

export async function anAxis({ scopes }: Organisation): Promise<string> {
  const { id: machineId } = await createMachine(scopes.engineer, { site: 'Hall', name: randomUUID() });
  const { id } = await createAxis(scopes.engineer, { machineId, ...AXIS_FIELDS });
  return id;
}

export function keepInput(kp = 2, reason = 'a test') {
  return {
    plant: { text: 'K=1 tau=10 theta=1' },
    controller: { kp, ti: 9 },
    requirement: { phaseMarginMin: 30 },
    reason,
  };
}

/** An axis with versions, and a change to the first of them taken to a state. */
export async function aChange(
  organisation: Organisation,
  state: SeedState,
): Promise<{ id: string; axis: SeededAxis }> {
  const axisId = await anAxis(organisation);
  const first = await keepGainSet(organisation.scopes.engineer, axisId, keepInput(2));
  const second = await keepGainSet(organisation.scopes.engineer, axisId, keepInput(3));
  const axis = { axisId, gainSetIds: [first.id, second.id] };
  return { id: await seedChange(organisation.cast, axis, 1, state, { reason: 'a test' }), axis };
}
