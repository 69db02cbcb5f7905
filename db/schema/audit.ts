import { bigint, index, pgTable, primaryKey, text, uuid, integer, jsonb } from 'drizzle-orm/pg-core';
import { json, moment, orgId } from './columns';
import { organisations } from './people';

/** Who did what to what, per organisation in one hash chain. No foreign keys: history outlives its subject. */
export const auditEvents = pgTable(
  'audit_events',
  {
    orgId: orgId(),
    seq: integer('seq').notNull(),
    at: moment('at').notNull(),
    actorKind: text('actor_kind').notNull(),
    actorId: uuid('actor_id'),
    actorName: text('actor_name').notNull(),
    action: text('action').notNull(),
    subjectKind: text('subject_kind').notNull(),
    subjectId: uuid('subject_id'),
    detail: json<Record<string, unknown>>('detail').notNull(),
    previousHash: text('previous_hash').notNull(),
    hash: text('hash').notNull(),
  },
  (table) => [
    primaryKey({ columns: [table.orgId, table.seq] }),
    index('audit_events_subject').on(table.orgId, table.subjectKind, table.subjectId),
  ],
);

/** End of each organisation's chain, and the last change number; its row lock serialises both. */
export const counters = pgTable('counters', {
  orgId: orgId()
    .primaryKey()
    .references(() => organisations.id),
  auditSeq: integer('audit_seq').notNull().default(0),
  auditHash: text('audit_hash').notNull().default(''),
  changeNumber: integer('change_number').notNull().default(0),
});

/** Answers already given to a post with an idempotency key. */
export const idempotencyKeys = pgTable(
  'idempotency_keys',
  {
    orgId: orgId(),
    personId: uuid('person_id').notNull(),
    key: text('key').notNull(),
    requestDigest: text('request_digest').notNull(),
    status: integer('status'),
    body: jsonb('body').$type<unknown>(),
    createdAt: moment('created_at').notNull().defaultNow(),
  },
  (table) => [primaryKey({ columns: [table.orgId, table.personId, table.key] })],
);

/** Counters of refused sign-ins, in the shape of the rate limiter's PostgreSQL store. */
export const rateLimits = pgTable('rate_limits', {
  key: text('key').primaryKey(),
  points: integer('points').notNull().default(0),
  expire: bigint('expire', { mode: 'number' }),
});
