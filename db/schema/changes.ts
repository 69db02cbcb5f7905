import { sql } from 'drizzle-orm';
import {
  check,
  foreignKey,
  index,
  integer,
  pgTable,
  primaryKey,
  text,
  unique,
  uuid,
} from 'drizzle-orm/pg-core';
import type { ChangeAction, ChangeState } from '../../lib/change';
import { json, moment, orgId } from './columns';
import { gainSets } from './gain-sets';
import { axes } from './machines';

export type SafetyAnswer = 'no' | 'yes' | 'unknown';

/** A change from one version in service to another. Its state moves only by compare-and-set, one event a step. */
export const changes = pgTable(
  'changes',
  {
    orgId: orgId(),
    id: uuid('id').notNull().defaultRandom(),
    number: integer('number').notNull(),
    axisId: uuid('axis_id').notNull(),
    fromGainSetId: uuid('from_gain_set_id'),
    toGainSetId: uuid('to_gain_set_id').notNull(),
    state: text('state').notNull().$type<ChangeState>(),
    reason: text('reason').notNull(),
    risk: text('risk').notNull().default(''),
    test: text('test').notNull().default(''),
    wayBack: text('way_back').notNull().default(''),
    temporaryUntil: moment('temporary_until'),
    safetyFunction: text('safety_function').notNull().$type<SafetyAnswer>(),
    siteReference: text('site_reference').notNull().default(''),
    authorId: uuid('author_id').notNull(),
    authorName: text('author_name').notNull(),
    /** Named technician, or null for any. */
    technicianId: uuid('technician_id'),
    /** SHA-256 of what is signed. */
    contentHash: text('content_hash').notNull(),
    rowVersion: integer('row_version').notNull().default(1),
    createdAt: moment('created_at').notNull().defaultNow(),
    changedAt: moment('changed_at').notNull().defaultNow(),
  },
  (table) => [
    primaryKey({ columns: [table.orgId, table.id] }),
    unique('changes_number').on(table.orgId, table.number),
    index('changes_state').on(table.orgId, table.state),
    index('changes_axis').on(table.orgId, table.axisId),
    foreignKey({ columns: [table.orgId, table.axisId], foreignColumns: [axes.orgId, axes.id] }),
    foreignKey({
      name: 'changes_to',
      columns: [table.orgId, table.axisId, table.toGainSetId],
      foreignColumns: [gainSets.orgId, gainSets.axisId, gainSets.id],
    }),
    foreignKey({
      name: 'changes_from',
      columns: [table.orgId, table.axisId, table.fromGainSetId],
      foreignColumns: [gainSets.orgId, gainSets.axisId, gainSets.id],
    }),
    check('changes_safety_function', sql`${table.safetyFunction} in ('no', 'yes', 'unknown')`),
  ],
);

/** Each step of a change, appended and never altered; the hashes make a chain. */
export const changeEvents = pgTable(
  'change_events',
  {
    orgId: orgId(),
    changeId: uuid('change_id').notNull(),
    seq: integer('seq').notNull(),
    action: text('action').notNull().$type<ChangeAction | 'draft'>(),
    byId: uuid('by_id').notNull(),
    byName: text('by_name').notNull(),
    byRole: text('by_role').notNull(),
    at: moment('at').notNull(),
    /** What the signature under this step means, in words. */
    meaning: text('meaning'),
    remark: text('remark').notNull().default(''),
    payload: json<Record<string, unknown>>('payload').notNull(),
    contentHash: text('content_hash').notNull(),
    previousHash: text('previous_hash').notNull(),
    hash: text('hash').notNull(),
  },
  (table) => [
    primaryKey({ columns: [table.orgId, table.changeId, table.seq] }),
    index('change_events_at').on(table.orgId, table.at),
    foreignKey({ columns: [table.orgId, table.changeId], foreignColumns: [changes.orgId, changes.id] }),
  ],
);

export type Values = Readonly<Record<string, number>>;

export interface DeviceIdentity {
  readonly deviceLabel: string;
  readonly slot?: string;
  readonly firmware?: string;
}

/** What the technician found and left at the machine; appended, never altered. */
export const fieldReports = pgTable(
  'field_reports',
  {
    orgId: orgId(),
    id: uuid('id').notNull().defaultRandom(),
    changeId: uuid('change_id').notNull(),
    kind: text('kind').notNull().$type<'apply' | 'verify' | 'roll-back'>(),
    identity: json<DeviceIdentity>('identity'),
    asFound: json<Values>('as_found'),
    asLeft: json<Values>('as_left'),
    saved: text('saved').$type<'yes' | 'not-applicable'>(),
    remark: text('remark').notNull().default(''),
    enteredBy: uuid('entered_by').notNull(),
    enteredByName: text('entered_by_name').notNull(),
    /** When it was written down, by the clock of that device; null when it was sent at once. */
    enteredAt: moment('entered_at'),
    receivedAt: moment('received_at').notNull().defaultNow(),
  },
  (table) => [
    primaryKey({ columns: [table.orgId, table.id] }),
    index('field_reports_change').on(table.orgId, table.changeId),
    check('field_reports_kind', sql`${table.kind} in ('apply', 'verify', 'roll-back')`),
    foreignKey({ columns: [table.orgId, table.changeId], foreignColumns: [changes.orgId, changes.id] }),
  ],
);
