import { join } from 'node:path';
import { answers, root, start, stop } from './processes.mjs';

/** A ceiling for the web process' heap: at rest the whole process then stays well under 350 MB. */
const HEAP_MB = 220;

/** Starts web and worker, and waits until the web answers. Returns null when it doesn't. */
export async function serve(env, port, stdio = 'inherit') {
  const next = join(root, 'node_modules', 'next', 'dist', 'bin', 'next');
  const shared = { ...env, PORT: String(port), NODE_ENV: 'production', NEXT_TELEMETRY_DISABLED: '1' };
  const web = start(
    process.execPath,
    [`--max-old-space-size=${HEAP_MB}`, next, 'start', '-H', '127.0.0.1', '-p', String(port)],
    { env: shared, stdio },
  );
  const worker = start(process.execPath, ['--import', 'tsx', 'worker/main.ts'], { env: shared, stdio });
  const children = [web, worker];
  const up = await answers(`http://127.0.0.1:${port}/api/health`, 60, () => web.exitCode === null);
  const end = () => Promise.all(children.map(stop));
  if (up) return { children, stop: end };
  await end();
  return null;
}
