// Reads a backup into an empty database: `npm run restore -- fettle.dump`, then `npm start`.
import { existsSync } from 'node:fs';
import { withClient } from './lib/cluster.mjs';
import { namedFile, postgresProgram, withDatabase } from './lib/dump.mjs';
import { run, say, Sentence } from './lib/say.mjs';

const TABLES = `select from pg_tables where schemaname not in ('pg_catalog', 'information_schema')`;
const APP_ROLE = `do $$ begin
  if not exists (select from pg_roles where rolname = 'fettle_app') then create role fettle_app nologin; end if;
end $$`;

async function main() {
  const file = namedFile('npm run restore -- fettle.dump');
  if (!existsSync(file)) throw new Sentence(`There is no file ${file}.`);
  await withDatabase(async (url, bin) => {
    await withClient(url, async (client) => {
      if ((await client.query(TABLES)).rowCount > 0)
        throw new Sentence('The database is not empty; a backup is read into an empty one only.');
      await client.query(APP_ROLE);
      await client.query('grant fettle_app to current_user');
    });
    const args = ['--no-owner', '--exit-on-error', '--single-transaction', `--dbname=${url}`, file];
    await postgresProgram(bin, 'pg_restore', args, 'The backup could not be read');
  });
  say('The backup is in the database; `npm start` brings it up to date and serves it.');
}

await run(main);
