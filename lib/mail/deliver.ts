import { and, asc, eq, isNull, lte, sql } from 'drizzle-orm';
import type { Transporter } from 'nodemailer';
import { outboxMessages } from '../../db/schema';
import { withSystem } from '../../db/tx';
import { environment } from '../env';
import { log } from '../log';

/** Headers by which the local inbox knows whose letter it is; a real service ignores them. */
export const ORG_HEADER = 'x-fettle-organisation';

/** Wait before the next try, s: a minute at first, doubled each time, at most six hours. */
function backOffS(attempts: number): number {
  return Math.min(60 * 2 ** attempts, 6 * 3600);
}

/**
 * Sends one due letter. The row stays locked while it is being sent, so that two workers never send it twice; a
 * refusal only puts it off.
 *
 * @returns whether there was one
 */
export async function deliverNext(transport: Transporter): Promise<boolean> {
  return withSystem(async (tx) => {
    const [letter] = await tx
      .select()
      .from(outboxMessages)
      .where(and(isNull(outboxMessages.sentAt), lte(outboxMessages.nextAttemptAt, sql`now()`)))
      .orderBy(asc(outboxMessages.createdAt))
      .limit(1)
      .for('update', { skipLocked: true });
    if (!letter) return false;
    const own = and(eq(outboxMessages.orgId, letter.orgId), eq(outboxMessages.id, letter.id));
    try {
      await transport.sendMail({
        from: environment().MAIL_FROM,
        to: { name: letter.toName, address: letter.toEmail },
        subject: letter.subject,
        text: letter.body,
        messageId: `<${letter.id}@fettle>`,
        headers: { [ORG_HEADER]: letter.orgId },
      });
      await tx
        .update(outboxMessages)
        .set({ sentAt: sql`now()`, lastError: null })
        .where(own);
    } catch (error) {
      const lastError = error instanceof Error ? error.message : String(error);
      log.warn({ letter: letter.id, lastError }, 'a letter could not be sent; it is tried again later');
      const next = sql`now() + make_interval(secs => ${backOffS(letter.attempts)})`;
      await tx
        .update(outboxMessages)
        .set({ attempts: letter.attempts + 1, nextAttemptAt: next, lastError })
        .where(own);
    }
    return true;
  });
}
