import { spawn } from 'node:child_process';
import { createServer } from 'node:net';
import { fileURLToPath } from 'node:url';

export const root = fileURLToPath(new URL('../..', import.meta.url)).replace(/\/$/, '');

/** Runs a command to its end. `quiet` keeps its output and hands it back. */
export function command(program, args, { quiet = false, ...options } = {}) {
  return new Promise((resolve) => {
    const child = spawn(program, args, { cwd: root, stdio: quiet ? 'pipe' : 'inherit', ...options });
    let output = '';
    child.stdout?.on('data', (part) => (output += part));
    child.stderr?.on('data', (part) => (output += part));
    child.on('error', (error) => resolve({ code: 127, output: String(error) }));
    child.on('close', (code, signal) => resolve({ code: code ?? (signal ? 1 : 0), output }));
  });
}

/** Starts a program that goes on running, in a group of its own so that a Ctrl-C reaches it through us alone. */
export function start(program, args, options = {}) {
  return spawn(program, args, { cwd: root, stdio: 'inherit', detached: true, ...options });
}

/** Asks a program to end, and ends it after a while. */
export async function stop(child) {
  if (!child || child.exitCode !== null || child.signalCode !== null) return;
  const ended = new Promise((resolve) => child.once('close', resolve));
  child.kill('SIGTERM');
  const late = setTimeout(() => child.kill('SIGKILL'), 8000);
  await ended;
  clearTimeout(late);
}

export function portIsFree(port) {
  return new Promise((resolve) => {
    const probe = createServer();
    probe.once('error', () => resolve(false));
    probe.listen(port, '127.0.0.1', () => probe.close(() => resolve(true)));
  });
}

/** A port that nobody listens on: the wanted one if it is free, else any. */
export function freePort(wanted = 0) {
  return new Promise((resolve, reject) => {
    const probe = createServer();
    probe.once('error', (error) => (wanted ? freePort(0).then(resolve, reject) : reject(error)));
    probe.listen(wanted, '127.0.0.1', () => {
      const { port } = probe.address();
      probe.close(() => resolve(port));
    });
  });
}

export const sleep = (milliseconds) => new Promise((resolve) => setTimeout(resolve, milliseconds));

/** Waits until an address answers with something better than a server error. */
export async function answers(url, seconds, stillRuns = () => true) {
  for (let i = 0; i < seconds * 4 && stillRuns(); i += 1) {
    try {
      const response = await fetch(url, { redirect: 'manual', signal: AbortSignal.timeout(3000) });
      if (response.status < 500) return true;
    } catch {
      // not yet
    }
    await sleep(250);
  }
  return false;
}
