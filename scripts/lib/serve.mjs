import { join } from 'node:path';
import { answers } from './ports.mjs';
import { hasEnded, root, start, stop } from './processes.mjs';
import { Sentence } from './say.mjs';

/** A ceiling for the web process' heap: at rest the whole process then stays well under 350 MB. */
const HEAP_MB = 220;
const UP_WITHIN_S = 60;

/**
 * Starts web and worker, and waits until the web answers.
 *
 * @param env must be complete: addresses, secrets, PORT
 * @param options stdio: where their output goes, as in `spawn`; isDev: serve the sources as they are edited
 * @returns the programs that run, and how to stop them
 */
export async function serve(env, { stdio = 'inherit', isDev = false } = {}) {
  const next = join(root, 'node_modules/next/dist/bin/next');
  const mode = isDev ? 'development' : 'production';
  const options = { env: { ...env, NODE_ENV: mode, NEXT_TELEMETRY_DISABLED: '1' }, stdio };
  const how = isDev ? [next, 'dev'] : [`--max-old-space-size=${HEAP_MB}`, next, 'start'];
  const web = start(process.execPath, [...how, '-H', '127.0.0.1', '-p', env.PORT], options);
  const worker = start(process.execPath, ['--import', 'tsx', 'worker/main.ts'], options);
  const children = [web, worker];
  const end = () => Promise.all(children.map(stop));
  const run = () => !children.some(hasEnded);
  try {
    if (!(await answers(`http://127.0.0.1:${env.PORT}/api/health`, UP_WITHIN_S, run)))
      throw new Sentence(
        `The ${hasEnded(worker) ? 'worker' : 'web server'} did not come up; its own message stands above.`,
      );
  } catch (error) {
    await end();
    throw error;
  }
  return { children, stop: end };
}
