import { setTimeout as sleep } from 'node:timers/promises';
import { closeDatabase } from '../db/client';
import { environment } from '../lib/env';
import { log } from '../lib/log';
import { deliverNext } from '../lib/mail/deliver';
import { startFakeInbox } from '../lib/mail/fake-inbox';
import { mailTransport } from '../lib/mail/transport';

const PAUSE_MS = 1000;

/** Sends the letters in the outbox until it is told to stop. */
async function main(): Promise<void> {
  const inbox = environment().SMTP_URL ? null : await startFakeInbox();
  const transport = mailTransport(inbox?.port ?? null);
  const stopping = new AbortController();
  for (const signal of ['SIGINT', 'SIGTERM'] as const) process.once(signal, () => stopping.abort());
  while (!stopping.signal.aborted) {
    try {
      if (await deliverNext(transport)) continue;
    } catch (error) {
      log.error({ err: error }, 'the outbox could not be read; trying again');
    }
    await sleep(PAUSE_MS, undefined, { signal: stopping.signal }).catch(() => undefined);
  }
  transport.close();
  await inbox?.stop();
  await closeDatabase();
}

await main();
