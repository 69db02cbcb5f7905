import { count, like } from 'drizzle-orm';
import { closeDatabase } from '../db/client';
import { persons } from '../db/schema';
import { seedDemo } from '../db/seed';
import { withSystem } from '../db/tx';
import { environment } from '../lib/env';

const { DEMO, DEMO_PASSWORD } = environment();

if (DEMO === 'on') await seedDemo({ password: DEMO_PASSWORD });
const [demo] = await withSystem((tx) =>
  tx.select({ people: count() }).from(persons).where(like(persons.email, '%@brackwater.example')),
);
if (demo.people > 0) process.stdout.write('the demo is there\n');
await closeDatabase();
