import { sql } from 'drizzle-orm';
import { persons } from '../schema';
import { withSystem } from '../tx';
import { seedChange, type SeedCast } from './changes';
import { BRACKWATER, NORTHGATE } from './demo-data';
import { seedOrganisation } from './organisation';
import { seedPlant } from './plant';

const LOCK = 715_230_613;

const PEOPLE = [
  { key: 'engineer', name: 'Mara Lindqvist', email: 'engineer@brackwater.example', roles: ['engineer'] },
  { key: 'approver', name: 'Tom Okafor', email: 'approver@brackwater.example', roles: ['approver'] },
  { key: 'technician', name: 'Jan Wouters', email: 'technician@brackwater.example', roles: ['technician'] },
  { key: 'admin', name: 'Ruth Abel', email: 'admin@brackwater.example', roles: ['admin'] },
] as const;

async function seedBrackwater(password: string): Promise<void> {
  const { scopes } = await seedOrganisation('Brackwater Packing', PEOPLE, password);
  const { engineer, approver, technician } = scopes;
  const cast: SeedCast = { engineer, approver, technician, password };
  const axes = await seedPlant(engineer, BRACKWATER);
  const first = { reason: 'First set of gains, as commissioned.' };
  await seedChange(cast, axes['TC-11'], 1, 'verified', first);
  await seedChange(cast, axes['SC-05'], 1, 'verified', first);
  await seedChange(cast, axes['LT-20'], 1, 'applied', first);
  await seedChange(cast, axes['PT-21'], 1, 'verified', first);
  await seedChange(cast, axes['FC-40'], 1, 'verified', first);
  await seedChange(cast, axes['PC-41'], 1, 'issued', { reason: 'Pressure sags when both sealers cycle.' });
  await seedChange(cast, axes['TC-11'], 2, 'submitted', {
    reason: 'Jaws come back too slowly after a film change.',
  });
  await seedChange(cast, axes['PT-21'], 2, 'draft', {
    reason: 'The pan lags behind the load at full speed.',
  });
}

async function seedNorthgate(password: string): Promise<void> {
  const people = [
    { key: 'engineer', name: 'Olaf Brandt', email: 'engineer@northgate.example', roles: ['engineer'] },
  ] as const;
  const { scopes } = await seedOrganisation('Northgate Pumps', people, password);
  await seedPlant(scopes.engineer, NORTHGATE);
}

/**
 * Fills an empty database with the demo; one with any person in it is left alone.
 *
 * @returns whether it was filled
 */
export async function seedDemo(options: { password: string }): Promise<boolean> {
  return withSystem(async (tx) => {
    // Two programs that start at once wait for each other here; the services work on connections of their own.
    await tx.execute(sql`select pg_advisory_xact_lock(${LOCK})`);
    const someone = await tx.select({ id: persons.id }).from(persons).limit(1);
    if (someone.length > 0) return false;
    await seedBrackwater(options.password);
    await seedNorthgate(options.password);
    return true;
  });
}
