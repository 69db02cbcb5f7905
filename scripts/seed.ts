import { closeDatabase } from '../db/client';
import { seedDemo } from '../db/seed';
import { environment } from '../lib/env';

const { DEMO, DEMO_PASSWORD } = environment();

if (DEMO === 'off') console.log('demo off');
else console.log((await seedDemo({ password: DEMO_PASSWORD })) ? 'seeded' : 'kept');
await closeDatabase();
