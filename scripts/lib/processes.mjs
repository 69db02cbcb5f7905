import { spawn } from 'node:child_process';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { stopSignal } from './stop-signal.mjs';

export const root = fileURLToPath(new URL('../..', import.meta.url)).replace(/\/$/, '');

const STOP_WITHIN_MS = 8000;

/**
 * Runs a command to its end. A request to stop ends it and throws.
 *
 * @param options those of `spawn`, and
 *   quiet: keep the output and hand it back instead of showing it;
 *   shielded: a request to stop neither reaches nor prevents it (it starts or ends something that must not be torn)
 * @returns exit code (127 when there is no such program) and the output, empty unless quiet
 */
export function command(program, args, { quiet = false, shielded = false, ...options } = {}) {
  return new Promise((resolve, reject) => {
    if (!shielded) stopSignal.throwIfAborted();
    const own = shielded ? { detached: true } : { signal: stopSignal };
    const stdio = ['ignore', ...(quiet ? ['pipe', 'pipe'] : ['inherit', 'inherit'])];
    const child = spawn(program, args, { cwd: root, stdio, ...own, ...options });
    let output = '';
    for (const stream of [child.stdout, child.stderr]) stream?.on('data', (part) => (output += part));
    child.on('error', (error) => {
      if (error.code !== 'ABORT_ERR') resolve({ code: 127, output: error.message });
    });
    child.on('close', (code) => {
      if (stopSignal.aborted && !shielded) reject(stopSignal.reason);
      else resolve({ code: code ?? 1, output });
    });
  });
}

/** Runs a program of an installed package; straight, since a wrapper would not hand a request to stop on. */
export function packageCommand(file, args, options) {
  return command(process.execPath, [join(root, 'node_modules', file), ...args], options);
}

/** Starts a program that goes on running. */
export function start(program, args, options = {}) {
  return spawn(program, args, { cwd: root, stdio: 'inherit', ...options });
}

export function hasEnded(child) {
  return child.exitCode !== null || child.signalCode !== null;
}

/** Asks a program to end, and ends it after a while. */
export async function stop(child) {
  if (hasEnded(child)) return;
  const ended = new Promise((resolve) => child.once('exit', resolve));
  child.kill('SIGTERM');
  const late = setTimeout(() => child.kill('SIGKILL'), STOP_WITHIN_MS);
  await ended;
  clearTimeout(late);
}
