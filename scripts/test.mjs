// Prepares everything and runs the suites: unit, reference, db, browser. `npm test -- unit db` runs some of them.
import { chmodSync, existsSync, mkdtempSync, readFileSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { installDebian, installPackages } from './lib/packages.mjs';
import { command, freePort } from './lib/processes.mjs';
import { run, say, Sentence } from './lib/say.mjs';

const SUITES = ['unit', 'reference', 'db', 'browser'];
const CHROMIUM = '/usr/bin/chromium';

function wantedSuites() {
  const named = process.argv.slice(2).filter((word) => !word.startsWith('-'));
  const unknown = named.find((name) => !SUITES.includes(name));
  if (unknown) throw new Sentence(`There is no suite “${unknown}”; there are ${SUITES.join(', ')}.`);
  return SUITES.filter((name) => named.length === 0 || named.includes(name));
}

function readReport(file) {
  if (!existsSync(file)) return null;
  try {
    return JSON.parse(readFileSync(file, 'utf8'));
  } catch {
    return null;
  }
}

/** A suite that ran nothing has failed: it was not tested. */
function counted(passed, failed, code) {
  if (passed + failed === 0) return { passed: 0, failed: 1 };
  return { passed, failed: failed === 0 && code !== 0 ? 1 : failed };
}

async function vitest(name, folder, env) {
  const report = join(folder, `${name}.json`);
  const args = [
    'vitest',
    'run',
    '--project',
    name,
    '--reporter=default',
    '--reporter=json',
    `--outputFile.json=${report}`,
  ];
  const { code } = await command('npx', args, { env });
  const result = readReport(report);
  return counted(result?.numPassedTests ?? 0, result?.numFailedTests ?? 0, code);
}

async function browser(folder, env, cluster) {
  const { ensureDatabase } = await import('./lib/cluster.mjs');
  const { migrate, seed } = await import('./lib/database.mjs');
  const { build } = await import('./lib/build.mjs');
  const { serve } = await import('./lib/serve.mjs');
  if (!existsSync(CHROMIUM)) await installDebian('chromium', 'The browser tests need Chromium');
  await ensureDatabase(cluster.urlOf('postgres'), 'browser');
  const port = await freePort();
  const own = {
    ...env,
    DATABASE_URL: cluster.urlOf('browser'),
    PORT: String(port),
    DEMO: 'on',
    LOG_LEVEL: 'warn',
  };
  await migrate(own);
  await seed(own);
  await build();
  const served = await serve(own, port, 'ignore');
  if (!served) throw new Sentence('The web server for the browser tests did not come up.');
  try {
    const report = join(folder, 'browser.json');
    const { code } = await command('npx', ['playwright', 'test'], {
      env: { ...own, BASE_URL: `http://127.0.0.1:${port}`, PLAYWRIGHT_JSON_OUTPUT_NAME: report, CHROMIUM },
    });
    const stats = readReport(report)?.stats;
    return counted(stats?.expected ?? 0, (stats?.unexpected ?? 0) + (stats?.flaky ?? 0), code);
  } finally {
    await served.stop();
  }
}

async function main() {
  const suites = wantedSuites();
  await installPackages();
  const folder = mkdtempSync(join(tmpdir(), 'fettle-test-'));
  chmodSync(folder, 0o755);
  const env = {
    ...process.env,
    SESSION_SECRET: 'a secret for tests alone, 32 letters+',
    PASSWORD_COST: '4',
    NEXT_TELEMETRY_DISABLED: '1',
  };
  for (const name of ['DATABASE_URL', 'SMTP_URL', 'APP_URL', 'PORT', 'DEMO', 'DEMO_PASSWORD', 'MAIL_FROM'])
    delete env[name];
  const needsDatabase = suites.some((name) => name === 'db' || name === 'browser');
  const { startCluster, ensureDatabase } = await import('./lib/cluster.mjs');
  let cluster = null;
  const results = {};
  try {
    if (needsDatabase)
      cluster = await startCluster({ folder: join(folder, 'postgres'), port: await freePort(), fast: true });
    for (const name of suites) {
      say(`\n== ${name} ==`);
      if (name === 'browser') results[name] = await browser(folder, env, cluster);
      else if (name === 'db') {
        await ensureDatabase(cluster.urlOf('postgres'), 'tests');
        results[name] = await vitest(name, folder, { ...env, DATABASE_URL: cluster.urlOf('tests') });
      } else results[name] = await vitest(name, folder, env);
    }
  } finally {
    await cluster?.stop();
    rmSync(folder, { recursive: true, force: true });
  }
  return summary(results);
}

function summary(results) {
  let passed = 0;
  let failed = 0;
  say('');
  for (const [name, result] of Object.entries(results)) {
    say(`${name}: ${result.passed} passed, ${result.failed} failed`);
    passed += result.passed;
    failed += result.failed;
  }
  say(`${passed} passed, ${failed} failed`);
  return failed === 0 ? 0 : 1;
}

await run(main);
