import { dirname, join, resolve } from 'node:path';
import { installPackages } from './packages.mjs';
import { command } from './processes.mjs';
import { Sentence } from './say.mjs';

/** The file named on the command line. */
export function namedFile(example) {
  const [, , file] = process.argv;
  if (!file) throw new Sentence(`Name the file: ${example}`);
  return resolve(process.env.INIT_CWD ?? process.cwd(), file);
}

/** Does work with the database that `npm start` would take, and the folder of PostgreSQL's programs. */
export async function withDatabase(work) {
  await installPackages();
  const { startCluster } = await import('./cluster.mjs');
  const { checkUrl } = await import('./database.mjs');
  const { findServer } = await import('./postgres-server.mjs');
  const given = process.env.DATABASE_URL;
  if (given) await checkUrl(given);
  const cluster = given ? null : await startCluster();
  try {
    return await work(given || cluster.url, cluster ? cluster.bin : await findServer());
  } finally {
    await cluster?.stop();
  }
}

/** Runs one of PostgreSQL's programs; its own words are the reason when it fails. */
export async function postgresProgram(bin, name, args, what) {
  const { code, output } = await command(join(bin, name), args, { quiet: true, cwd: dirname(bin) });
  if (code !== 0) throw new Sentence(`${what}: ${output.trim().split('\n').at(-1)}`);
}
