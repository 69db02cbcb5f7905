import { closeSync, existsSync, openSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import { build } from './build.mjs';
import { migrate, seed } from './database.mjs';
import { installDebian } from './packages.mjs';
import { freePort } from './ports.mjs';
import { packageCommand } from './processes.mjs';
import { counted, readReport } from './reports.mjs';
import { say } from './say.mjs';
import { serve } from './serve.mjs';

const CHROMIUM = '/usr/bin/chromium';
const LOG_LINES = 40;

/** Runs the browser tests against the production build, on a port and a seeded database of their own. */
export async function browserSuite(folder, env) {
  if (!existsSync(CHROMIUM)) await installDebian('chromium', 'The browser tests need Chromium');
  const port = String(await freePort());
  const report = join(folder, 'browser.json');
  const own = {
    ...env,
    PORT: port,
    DEMO: 'on',
    BASE_URL: `http://127.0.0.1:${port}`,
    PLAYWRIGHT_JSON_OUTPUT_NAME: report,
    CHROMIUM,
  };
  await migrate(own);
  await seed(own);
  await build();
  const logFile = join(folder, 'server.log');
  const log = openSync(logFile, 'a');
  let served = null;
  try {
    served = await serve(own, { stdio: ['ignore', log, log] });
    const { code } = await packageCommand('@playwright/test/cli.js', ['test'], { env: own });
    const stats = readReport(report)?.stats;
    const result = counted(stats?.expected, stats && stats.unexpected + stats.flaky, code);
    if (result.failed > 0) showEnd(logFile);
    return result;
  } catch (error) {
    showEnd(logFile);
    throw error;
  } finally {
    await served?.stop();
    closeSync(log);
  }
}

function showEnd(logFile) {
  const lines = readFileSync(logFile, 'utf8').trim().split('\n').slice(-LOG_LINES);
  say(`\nThe end of the server’s log:\n${lines.join('\n')}`);
}
