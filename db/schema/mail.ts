import { index, integer, pgTable, primaryKey, text, uuid } from 'drizzle-orm/pg-core';
import { moment, orgId } from './columns';

/** Letters waiting to be sent; written in the transaction of what they tell about. */
export const outboxMessages = pgTable(
  'outbox_messages',
  {
    orgId: orgId(),
    id: uuid('id').notNull().defaultRandom(),
    kind: text('kind').notNull(),
    toEmail: text('to_email').notNull(),
    toName: text('to_name').notNull(),
    subject: text('subject').notNull(),
    body: text('body').notNull(),
    createdAt: moment('created_at').notNull().defaultNow(),
    attempts: integer('attempts').notNull().default(0),
    nextAttemptAt: moment('next_attempt_at').notNull().defaultNow(),
    lastError: text('last_error'),
    sentAt: moment('sent_at'),
  },
  (table) => [
    primaryKey({ columns: [table.orgId, table.id] }),
    index('outbox_messages_due').on(table.sentAt, table.nextAttemptAt),
  ],
);

/** The local fake inbox: what the worker's own mail server received. Used when no mail service is set. */
export const inboxMessages = pgTable(
  'inbox_messages',
  {
    orgId: orgId(),
    id: uuid('id').notNull().defaultRandom(),
    messageId: text('message_id').notNull().unique(),
    toEmail: text('to_email').notNull(),
    subject: text('subject').notNull(),
    body: text('body').notNull(),
    receivedAt: moment('received_at').notNull().defaultNow(),
  },
  (table) => [
    primaryKey({ columns: [table.orgId, table.id] }),
    index('inbox_messages_received').on(table.orgId, table.receivedAt),
  ],
);
