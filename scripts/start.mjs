// Makes a fresh machine ready and serves: packages, database, migration, demo, build, web and worker.
// With the word “dev” it serves the sources as they are edited, without a build.
import { randomBytes } from 'node:crypto';
import { existsSync, mkdirSync, readFileSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { installPackages } from './lib/packages.mjs';
import { portObjection } from './lib/ports.mjs';
import { root } from './lib/processes.mjs';
import { run, say, Sentence } from './lib/say.mjs';
import { stopSignal } from './lib/stop-signal.mjs';

async function wantedPort() {
  const port = Number(process.env.PORT || 3000);
  if (!Number.isInteger(port) || port < 1 || port > 65_535)
    throw new Sentence(`PORT must be a whole number from 1 to 65535, not “${process.env.PORT}”.`);
  const objection = await portObjection(port);
  if (objection === 'EACCES')
    throw new Sentence(`Port ${port} is for root alone; choose one from 1024 on: PORT=3001 npm start.`);
  if (objection)
    throw new Sentence(
      `Port ${port} is in use. Stop what runs there, or choose another: PORT=${port === 3001 ? 3002 : 3001} npm start.`,
    );
  return String(port);
}

/** Seals the session cookies; made once and kept, so that a restart signs nobody out. */
function sessionSecret() {
  if (process.env.SESSION_SECRET) return process.env.SESSION_SECRET;
  const file = join(root, '.data', 'session-secret');
  if (!existsSync(file)) {
    mkdirSync(join(root, '.data'), { recursive: true });
    writeFileSync(file, randomBytes(32).toString('base64url'), { mode: 0o600 });
  }
  return readFileSync(file, 'utf8').trim();
}

function greet(port, demo) {
  say(`\nFettle serves at http://127.0.0.1:${port}   (Ctrl-C stops it)`);
  if (demo === 'none') return;
  const password = process.env.DEMO_PASSWORD || 'brackwater-demo';
  say(`Demo sign-ins, password ${demo === 'known' ? `“${password}”` : 'as it was set before'}:`);
  for (const name of ['engineer', 'approver', 'technician', 'admin']) say(`  ${name}@brackwater.example`);
  say('  engineer@northgate.example   (another organisation)');
}

/** Waits until asked to stop, or until one of the programs ends by itself, which is a failure. */
async function untilEnd([web, worker]) {
  const first = await new Promise((resolve) => {
    stopSignal.addEventListener('abort', () => resolve(null));
    if (stopSignal.aborted) resolve(null);
    for (const [name, child] of Object.entries({ web, worker }))
      child.once('exit', (code, signal) => resolve(`${name} ended by itself (${signal ?? `code ${code}`})`));
  });
  if (!first) return 0;
  say(`The ${first}; stopping the rest.`);
  return 1;
}

async function main() {
  const port = await wantedPort();
  await installPackages();
  const { startCluster } = await import('./lib/cluster.mjs');
  const { checkUrl, migrate, seed } = await import('./lib/database.mjs');
  const { build } = await import('./lib/build.mjs');
  const { serve } = await import('./lib/serve.mjs');

  const isDev = process.argv[2] === 'dev';
  const given = process.env.DATABASE_URL;
  if (given) await checkUrl(given);
  const cluster = given ? null : await startCluster();
  let served = null;
  try {
    const env = {
      ...process.env,
      DATABASE_URL: given || cluster.url,
      SESSION_SECRET: sessionSecret(),
      PORT: port,
    };
    await migrate(env);
    const demo = await seed(env);
    if (!isDev) await build();
    served = await serve(env, { isDev });
    greet(port, demo);
    return await untilEnd(served.children);
  } finally {
    await served?.stop();
    await cluster?.stop();
  }
}

await run(main);
