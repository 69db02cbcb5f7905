// Writes the whole database to one file: `npm run backup -- fettle.dump`. It may run while Fettle serves.
import { existsSync, renameSync } from 'node:fs';
import { namedFile, postgresProgram, withDatabase } from './lib/dump.mjs';
import { run, say, Sentence } from './lib/say.mjs';

async function main() {
  const file = namedFile('npm run backup -- fettle.dump');
  if (existsSync(file)) throw new Sentence(`${file} is there already; name another file.`);
  process.umask(0o077);
  // Under another name first: a file that bears the name is whole.
  const unfinished = `${file}.unfinished`;
  await withDatabase((url, bin) =>
    postgresProgram(
      bin,
      'pg_dump',
      ['--format=custom', `--file=${unfinished}`, `--dbname=${url}`],
      'The backup could not be written',
    ),
  );
  renameSync(unfinished, file);
  say(`The database is in ${file}. It holds password hashes: keep it where only you can read it.`);
}

await run(main);
