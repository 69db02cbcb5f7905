import { sql } from 'drizzle-orm';
import {
  check,
  doublePrecision,
  index,
  foreignKey,
  integer,
  pgTable,
  primaryKey,
  text,
  unique,
  uuid,
} from 'drizzle-orm/pg-core';
import type { Convention } from '../../lib/control/forms';
import type { MeasurementFilter, Plant } from '../../lib/control/types';
import type { Requirement } from '../../lib/requirement';
import { json, moment, orgId } from './columns';
import { organisations } from './people';

export const machines = pgTable(
  'machines',
  {
    orgId: orgId().references(() => organisations.id),
    id: uuid('id').notNull().defaultRandom(),
    site: text('site').notNull(),
    name: text('name').notNull(),
    /** Shown on every sheet of this machine, beside the usual cautions. */
    cautions: text('cautions').notNull().default(''),
    rowVersion: integer('row_version').notNull().default(1),
    createdAt: moment('created_at').notNull().defaultNow(),
  },
  (table) => [
    primaryKey({ columns: [table.orgId, table.id] }),
    unique('machines_name').on(table.orgId, table.site, table.name),
  ],
);

export const axes = pgTable(
  'axes',
  {
    orgId: orgId(),
    id: uuid('id').notNull().defaultRandom(),
    machineId: uuid('machine_id').notNull(),
    tag: text('tag').notNull(),
    /** What it moves or heats. */
    name: text('name').notNull(),
    measurementUnit: text('measurement_unit').notNull(),
    outputUnit: text('output_unit').notNull(),
    actuatorLow: doublePrecision('actuator_low'),
    actuatorHigh: doublePrecision('actuator_high'),
    actuatorSlew: doublePrecision('actuator_slew'),
    sampleTimeS: doublePrecision('sample_time_s'),
    filter: json<MeasurementFilter>('filter'),
    convention: json<Convention>('convention').notNull(),
    requirement: json<Requirement>('requirement').notNull(),
    deviceLabel: text('device_label').notNull().default(''),
    inServiceGainSetId: uuid('in_service_gain_set_id'),
    inServiceSince: moment('in_service_since'),
    /** The highest version kept; the next one is this plus one, handed out under the row's lock. */
    lastVersion: integer('last_version').notNull().default(0),
    rowVersion: integer('row_version').notNull().default(1),
    createdAt: moment('created_at').notNull().defaultNow(),
  },
  (table) => [
    primaryKey({ columns: [table.orgId, table.id] }),
    unique('axes_tag').on(table.orgId, table.machineId, table.tag),
    index('axes_in_order').on(table.orgId, table.tag, table.id),
    check('axes_sample_time', sql`${table.sampleTimeS} > 0`),
    check('axes_actuator_slew', sql`${table.actuatorSlew} > 0`),
    foreignKey({ columns: [table.orgId, table.machineId], foreignColumns: [machines.orgId, machines.id] }),
  ],
);

/** The plant of a load case as it was typed and as it was read. */
export interface StoredPlant extends Plant {
  readonly text: string;
}

export const loadCases = pgTable(
  'load_cases',
  {
    orgId: orgId(),
    id: uuid('id').notNull().defaultRandom(),
    axisId: uuid('axis_id').notNull(),
    name: text('name').notNull(),
    position: integer('position').notNull(),
    /** Null until a plant is given. */
    plant: json<StoredPlant>('plant'),
  },
  (table) => [
    primaryKey({ columns: [table.orgId, table.id] }),
    unique('load_cases_name').on(table.orgId, table.axisId, table.name),
    foreignKey({ columns: [table.orgId, table.axisId], foreignColumns: [axes.orgId, axes.id] }),
  ],
);
