import { eq } from 'drizzle-orm';
import { closeDatabase } from '../db/client';
import { persons } from '../db/schema';
import { withSystem } from '../db/tx';
import { passwordMatches } from '../lib/auth/passwords';
import { environment } from '../lib/env';
import { tell } from './lib/tell';

const ONE_OF_THEM = 'engineer@brackwater.example';

/** Whether the demo people are there, and whether DEMO_PASSWORD lets them in. */
async function demoState(password: string): Promise<'none' | 'known' | 'changed'> {
  const [person] = await withSystem((tx) =>
    tx.select({ hash: persons.passwordHash }).from(persons).where(eq(persons.email, ONE_OF_THEM)),
  );
  if (!person) return 'none';
  return (await passwordMatches(password, person.hash)) ? 'known' : 'changed';
}

await tell(async () => {
  const { DEMO, DEMO_PASSWORD } = environment();
  const before = await demoState(DEMO_PASSWORD);
  if (DEMO === 'off' || before !== 'none') return before;
  // Loaded only now: the demo is written through all of the services, and later starts do without them.
  const { seedDemo } = await import('../db/seed');
  await seedDemo({ password: DEMO_PASSWORD });
  return demoState(DEMO_PASSWORD);
});
await closeDatabase();
