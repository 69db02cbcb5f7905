import type { AddressInfo } from 'node:net';
import { simpleParser } from 'mailparser';
import { SMTPServer } from 'smtp-server';
import { inboxMessages } from '../../db/schema';
import { withSystem } from '../../db/tx';
import { ORG_HEADER } from './deliver';

async function store(raw: Buffer): Promise<void> {
  const letter = await simpleParser(raw);
  const orgId = letter.headers.get(ORG_HEADER);
  if (typeof orgId !== 'string') throw new Error('a letter without organisation');
  const to = Array.isArray(letter.to) ? letter.to[0] : letter.to;
  await withSystem((tx) =>
    tx
      .insert(inboxMessages)
      .values({
        orgId,
        messageId: letter.messageId ?? '',
        toEmail: to?.value[0]?.address ?? '',
        subject: letter.subject ?? '',
        body: letter.text ?? '',
      })
      .onConflictDoNothing(),
  );
}

/**
 * A mail server on loopback that keeps what it gets, for the admin to read in the app. It speaks real SMTP, so that
 * sending is the same code with and without a mail service.
 *
 * @returns its port and how to stop it
 */
export async function startFakeInbox(): Promise<{ port: number; stop: () => Promise<void> }> {
  const server = new SMTPServer({
    authOptional: true,
    disabledCommands: ['STARTTLS', 'AUTH'],
    onData(stream, _session, done) {
      const parts: Buffer[] = [];
      stream.on('data', (part: Buffer) => parts.push(part));
      stream.on('end', () => {
        store(Buffer.concat(parts)).then(() => done(), done);
      });
    },
  });
  await new Promise<void>((resolve, reject) => {
    server.on('error', reject);
    server.listen(0, '127.0.0.1', resolve);
  });
  const { port } = server.server.address() as AddressInfo;
  return { port, stop: () => new Promise((resolve) => server.close(() => resolve())) };
}
