import { createHash } from 'node:crypto';
import { existsSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { command, root } from './processes.mjs';
import { say, Sentence } from './say.mjs';

const stampFile = join(root, 'node_modules', '.fettle-stamp');

function lockfileHash() {
  return createHash('sha256')
    .update(readFileSync(join(root, 'package-lock.json')))
    .digest('hex');
}

/** Installs the packages of the lockfile when they are missing or of another lockfile. */
export async function installPackages() {
  const wanted = lockfileHash();
  if (existsSync(stampFile) && readFileSync(stampFile, 'utf8') === wanted) return;
  say('Installing the packages of the lockfile …');
  rmSync(stampFile, { force: true });
  // The build checks types, so it needs the development packages too, whatever NODE_ENV says.
  const args = ['ci', '--include=dev', '--no-audit', '--no-fund', '--loglevel=error'];
  const { code } = await command('npm', args);
  if (code !== 0)
    throw new Sentence('The packages of package-lock.json could not be installed; the reason stands above.');
  writeFileSync(stampFile, wanted);
}

/** Installs a Debian package; only root may. */
export async function installDebian(name, why) {
  if (process.getuid?.() !== 0)
    throw new Sentence(
      `${why}, and installing it needs root: run “apt-get install ${name}” as root once, then start again.`,
    );
  say(`Installing Debian’s ${name} …`);
  // Shielded: an installation that is torn in the middle leaves the machine's package list broken.
  const options = {
    env: { ...process.env, DEBIAN_FRONTEND: 'noninteractive' },
    quiet: true,
    shielded: true,
  };
  await command('apt-get', ['update', '-qq'], options);
  const args = ['install', '-y', '-qq', '--no-install-recommends', name];
  const { code, output } = await command('apt-get', args, options);
  if (code === 0) return;
  const last = output.trim().split('\n').at(-1);
  throw new Sentence(`${why}, and Debian’s ${name} could not be installed: ${last}`);
}
