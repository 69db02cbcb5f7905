import { migrateDatabase } from '../db/migrate';
import { environment } from '../lib/env';
import { tell } from './lib/tell';

await tell(() => migrateDatabase(environment().DATABASE_URL));
