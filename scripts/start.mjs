// Makes a fresh machine ready and serves: packages, database, migration, demo, build, web and worker.
import { randomBytes } from 'node:crypto';
import { existsSync, mkdirSync, readFileSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { installPackages } from './lib/packages.mjs';
import { portIsFree, root } from './lib/processes.mjs';
import { run, say, Sentence } from './lib/say.mjs';

function wantedPort() {
  const port = Number(process.env.PORT || 3000);
  if (Number.isInteger(port) && port > 0 && port < 65_536) return port;
  throw new Sentence(`PORT must be a number from 1 to 65535, not “${process.env.PORT}”.`);
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

function greet(port, hasDemo) {
  say(`\nFettle serves at http://127.0.0.1:${port}   (Ctrl-C stops it)`);
  if (!hasDemo) return;
  say(`Demo sign-ins, password “${process.env.DEMO_PASSWORD || 'brackwater-demo'}”:`);
  for (const name of ['engineer', 'approver', 'technician', 'admin']) say(`  ${name}@brackwater.example`);
  say('  engineer@northgate.example   (another organisation)');
}

async function main() {
  const port = wantedPort();
  if (!(await portIsFree(port)))
    throw new Sentence(
      `Port ${port} is in use. Stop what runs there, or choose another: PORT=3001 npm start.`,
    );
  await installPackages();
  const { startCluster } = await import('./lib/cluster.mjs');
  const { checkUrl, migrate, seed } = await import('./lib/database.mjs');
  const { build } = await import('./lib/build.mjs');
  const { serve } = await import('./lib/serve.mjs');

  const given = process.env.DATABASE_URL;
  if (given) await checkUrl(given);
  const cluster = given ? null : await startCluster();
  let served = null;
  const stopAll = async () => {
    await served?.stop();
    await cluster?.stop();
  };
  try {
    const env = {
      ...process.env,
      DATABASE_URL: given || cluster.url,
      SESSION_SECRET: sessionSecret(),
      PORT: String(port),
    };
    await migrate(env);
    const hasDemo = await seed(env);
    await build();
    served = await serve(env, port);
    if (!served) throw new Sentence('The web server did not come up; its own message stands above.');
    greet(port, hasDemo);
    return await untilEnd(served.children);
  } finally {
    await stopAll();
  }
}

/** Waits for Ctrl-C, or for one of the programs to end by itself, which is a failure. */
function untilEnd(children) {
  return new Promise((resolve) => {
    for (const signal of ['SIGINT', 'SIGTERM', 'SIGHUP']) process.once(signal, () => resolve(0));
    for (const child of children)
      child.once('close', (code) => {
        say(`A part of Fettle ended by itself (code ${code}); stopping the rest.`);
        resolve(1);
      });
  });
}

await run(main);
