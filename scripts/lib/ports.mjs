import { createServer } from 'node:net';
import { setTimeout as sleep } from 'node:timers/promises';
import { stopSignal } from './stop-signal.mjs';

const HOST = '127.0.0.1';

/** Listens for a moment. @returns the port, or the error's code when it can't be had */
function tryPort(port) {
  return new Promise((resolve) => {
    const probe = createServer();
    probe.once('error', (error) => resolve({ code: error.code }));
    probe.listen(port, HOST, () => {
      const { port: got } = probe.address();
      probe.close(() => resolve({ port: got }));
    });
  });
}

/** @returns null when a server could listen on the port, else why not: EADDRINUSE, EACCES … */
export async function portObjection(port) {
  return (await tryPort(port)).code ?? null;
}

/** A port that nobody listens on: the wanted one if it is free, else any. */
export async function freePort(wanted = 0) {
  const { port } = await tryPort(wanted);
  return port ?? (await tryPort(0)).port;
}

/** Waits until an address answers with something better than a server error. */
export async function answers(url, seconds, stillRuns = () => true) {
  for (let i = 0; i < seconds * 4 && stillRuns(); i += 1) {
    stopSignal.throwIfAborted();
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
