import { migrateDatabase } from '../db/migrate';
import { environment } from '../lib/env';

await migrateDatabase(environment().DATABASE_URL);
