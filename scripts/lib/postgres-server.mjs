import { createHash } from 'node:crypto';
import { existsSync, readdirSync, readFileSync, statSync } from 'node:fs';
import { dirname, join } from 'node:path';
import { installDebian } from './packages.mjs';
import { command, root } from './processes.mjs';
import { Sentence } from './say.mjs';

export const USER = 'fettle';

function serverFolders() {
  const debian = '/usr/lib/postgresql';
  const versions = existsSync(debian) ? readdirSync(debian).sort((a, b) => Number(b) - Number(a)) : [];
  return [
    ...versions.map((version) => join(debian, version, 'bin')),
    ...(process.env.PATH ?? '').split(':').filter(Boolean),
  ].filter((folder) => existsSync(join(folder, 'initdb')) && existsSync(join(folder, 'pg_ctl')));
}

async function versionOf(folder) {
  const { output } = await command(join(folder, 'postgres'), ['--version'], { quiet: true });
  return /(\d+)/.exec(output)?.[1];
}

/**
 * The folder of PostgreSQL's server programs, installed when there are none.
 *
 * @param data the cluster's data folder, if it is for one: what is there already needs the version that made it
 */
export async function findServer(data) {
  if (serverFolders().length === 0)
    await installDebian('postgresql', 'There is no PostgreSQL server and no DATABASE_URL');
  const folders = serverFolders();
  if (folders.length === 0)
    throw new Sentence(
      'PostgreSQL was installed, but its server programs are not found under /usr/lib/postgresql.',
    );
  const versionFile = data && join(data, 'PG_VERSION');
  if (!versionFile || !existsSync(versionFile)) return folders[0];
  const wanted = readFileSync(versionFile, 'utf8').trim();
  for (const folder of folders) if ((await versionOf(folder)) === wanted) return folder;
  throw new Sentence(
    `The database in ${data} was made by PostgreSQL ${wanted}, which is not installed any more: install postgresql-${wanted}, or move that folder away to start with an empty database.`,
  );
}

async function findUser() {
  const { code, output } = await command('getent', ['passwd', USER], { quiet: true });
  if (code !== 0) return null;
  const [, , uid, gid] = output.trim().split(':');
  return { uid: Number(uid), gid: Number(gid) };
}

/** PostgreSQL refuses to run as root: then a system user of its own runs it. Null means ourselves. */
export async function serverUser() {
  if (process.getuid?.() !== 0) return null;
  const known = await findUser();
  if (known) return known;
  const args = ['--system', '--user-group', '--no-create-home', '--shell', '/usr/sbin/nologin', USER];
  const { output } = await command('useradd', args, { quiet: true, shielded: true });
  const made = await findUser();
  if (!made) throw new Sentence(`A system user for the database could not be made: ${output.trim()}`);
  return made;
}

/** Whether another user may pass through a folder and all above it. */
function isReachable(folder) {
  for (let at = folder; at !== '/'; at = dirname(at))
    if (existsSync(at) && (statSync(at).mode & 0o001) === 0) return false;
  return true;
}

/** The first of some folders that the server's user can get to. */
export function reachableFolder(user, folders) {
  return user ? folders.find(isReachable) : folders[0];
}

/** Where the cluster lives: beside the sources, or in /var/lib when its user can't get there. */
export function clusterFolder(user) {
  if (reachableFolder(user, [root])) return join(root, '.data', 'postgres');
  const name = createHash('sha256').update(root).digest('hex').slice(0, 12);
  return join('/var/lib/fettle', name);
}
