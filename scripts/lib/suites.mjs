import { chmodSync, mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { browserSuite } from './browser-suite.mjs';
import { ensureDatabase, startCluster } from './cluster.mjs';
import { freePort } from './ports.mjs';
import { reachableFolder, serverUser } from './postgres-server.mjs';
import { packageCommand } from './processes.mjs';
import { counted, readReport } from './reports.mjs';
import { say, Sentence } from './say.mjs';

export const SUITES = ['unit', 'reference', 'db', 'browser'];
const WITH_DATABASE = ['db', 'browser'];

/** What a person may have set for their own server must not reach the tests. */
const NOT_FOR_TESTS = ['DATABASE_URL', 'SMTP_URL', 'APP_URL', 'PORT', 'DEMO', 'DEMO_PASSWORD', 'MAIL_FROM'];

function testEnvironment() {
  const env = {
    ...process.env,
    SESSION_SECRET: 'a secret for tests alone, 32 letters+',
    PASSWORD_COST: '4',
    LOG_LEVEL: 'warn',
  };
  for (const name of NOT_FOR_TESTS) delete env[name];
  return env;
}

async function vitestSuite(name, folder, env) {
  const report = join(folder, `${name}.json`);
  const reporters = ['--reporter=default', '--reporter=json', `--outputFile.json=${report}`];
  const { code } = await packageCommand('vitest/vitest.mjs', ['run', '--project', name, ...reporters], {
    env,
  });
  const result = readReport(report);
  return counted(result?.numPassedTests, result?.numFailedTests, code);
}

/** One suite; what keeps it from running at all counts as a failure of it, and the others still run. */
async function runSuite(...given) {
  try {
    return await attempt(...given);
  } catch (error) {
    if (!(error instanceof Sentence)) throw error;
    say(error.message);
    return { passed: 0, failed: 1 };
  }
}

async function attempt(name, folder, env, cluster) {
  if (!cluster) return vitestSuite(name, folder, env);
  await ensureDatabase(cluster.urlOf('postgres'), name);
  const own = { ...env, DATABASE_URL: cluster.urlOf(name) };
  return name === 'browser' ? browserSuite(folder, own) : vitestSuite(name, folder, own);
}

/**
 * Runs suites one after another, the ones with a database on a throw-away cluster; says how each went.
 *
 * @returns the sums of tests that passed and failed
 */
export async function runSuites(names) {
  const parent = reachableFolder(await serverUser(), [tmpdir(), '/var/tmp']);
  const folder = mkdtempSync(join(parent, 'fettle-test-'));
  chmodSync(folder, 0o755);
  const env = testEnvironment();
  const results = {};
  let cluster = null;
  try {
    for (const name of names) {
      say(`\n== ${name} ==`);
      const needsCluster = WITH_DATABASE.includes(name);
      if (needsCluster)
        cluster ??= await startCluster({
          folder: join(folder, 'postgres'),
          port: await freePort(),
          fast: true,
        });
      results[name] = await runSuite(name, folder, env, needsCluster ? cluster : null);
    }
  } finally {
    await cluster?.stop();
    rmSync(folder, { recursive: true, force: true });
  }
  return summary(results);
}

function summary(results) {
  const sums = { passed: 0, failed: 0 };
  say('');
  for (const [name, { passed, failed }] of Object.entries(results)) {
    say(`${name}: ${passed} passed, ${failed} failed`);
    sums.passed += passed;
    sums.failed += failed;
  }
  return sums;
}
