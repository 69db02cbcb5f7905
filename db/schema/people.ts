import { sql } from 'drizzle-orm';
import { boolean, check, index, primaryKey, pgTable, text, uuid } from 'drizzle-orm/pg-core';
import { ROLES, type Role } from '../../lib/change';
import { moment, orgId } from './columns';

export const organisations = pgTable('organisations', {
  id: uuid('id').primaryKey().defaultRandom(),
  name: text('name').notNull(),
  /** One person may approve what they drafted; every record then says so. */
  onePersonShop: boolean('one_person_shop').notNull().default(false),
  createdAt: moment('created_at').notNull().defaultNow(),
});

export const persons = pgTable(
  'persons',
  {
    id: uuid('id').primaryKey().defaultRandom(),
    /** Lower case. */
    email: text('email').notNull().unique(),
    name: text('name').notNull(),
    passwordHash: text('password_hash').notNull(),
    createdAt: moment('created_at').notNull().defaultNow(),
    deactivatedAt: moment('deactivated_at'),
  },
  (table) => [check('persons_email_lower_case', sql`${table.email} = lower(${table.email})`)],
);

const KNOWN_ROLES = sql.raw(`array[${ROLES.map((role) => `'${role}'`).join(', ')}]`);

export const memberships = pgTable(
  'memberships',
  {
    orgId: orgId().references(() => organisations.id),
    personId: uuid('person_id')
      .notNull()
      .references(() => persons.id),
    roles: text('roles').array().notNull().$type<Role[]>(),
  },
  (table) => [
    primaryKey({ columns: [table.orgId, table.personId] }),
    index('memberships_person').on(table.personId),
    check('memberships_roles', sql`cardinality(${table.roles}) > 0 and ${table.roles} <@ ${KNOWN_ROLES}`),
  ],
);

export const sessions = pgTable(
  'sessions',
  {
    id: uuid('id').primaryKey().defaultRandom(),
    personId: uuid('person_id')
      .notNull()
      .references(() => persons.id),
    orgId: orgId().references(() => organisations.id),
    createdAt: moment('created_at').notNull().defaultNow(),
    expiresAt: moment('expires_at').notNull(),
    endedAt: moment('ended_at'),
  },
  (table) => [index('sessions_person').on(table.personId)],
);

export const apiTokens = pgTable(
  'api_tokens',
  {
    orgId: orgId().references(() => organisations.id),
    id: uuid('id').notNull().defaultRandom(),
    personId: uuid('person_id')
      .notNull()
      .references(() => persons.id),
    name: text('name').notNull(),
    tokenHash: text('token_hash').notNull().unique(),
    role: text('role').notNull().$type<Role>(),
    createdAt: moment('created_at').notNull().defaultNow(),
    expiresAt: moment('expires_at').notNull(),
    lastUsedAt: moment('last_used_at'),
    revokedAt: moment('revoked_at'),
  },
  (table) => [
    primaryKey({ columns: [table.orgId, table.id] }),
    index('api_tokens_person').on(table.orgId, table.personId),
    check('api_tokens_role', sql`${table.role} = any (${KNOWN_ROLES})`),
  ],
);
