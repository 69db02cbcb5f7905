import { sql } from 'drizzle-orm';
import {
  check,
  doublePrecision,
  foreignKey,
  integer,
  pgTable,
  primaryKey,
  text,
  unique,
  uuid,
} from 'drizzle-orm/pg-core';
import type { Convention, DeviceRow } from '../../lib/control/forms';
import type { Actuator, IdealController, Margins } from '../../lib/control/types';
import type { Requirement, Verdict } from '../../lib/requirement';
import type { EngineAgreement, LoadResponse, SetpointResponse } from '../../lib/sim/types';
import { json, moment, orgId } from './columns';
import { axes, type StoredPlant } from './machines';

/** A response with short curves for pictures; the figures are those of the full computation. */
export type KeptCurve = { t: number[]; y: number[]; u: number[] };

/** A check as it is kept: figures in full, curves thinned out. */
export interface KeptCheck {
  readonly name: string;
  readonly stable: boolean;
  readonly margins: Margins;
  readonly setpoint: (Omit<SetpointResponse, 't' | 'y' | 'u'> & KeptCurve) | null;
  readonly load: (Omit<LoadResponse, 't' | 'y' | 'u'> & KeptCurve) | null;
  readonly engines: EngineAgreement | null;
  readonly warnings: readonly string[];
}

export interface KeptSettings {
  readonly type?: string;
  readonly aggressiveness?: number;
  readonly variant?: string;
  readonly [key: string]: unknown;
}

/** Numbered versions of an axis. A trigger refuses every update and delete: what is kept stays as it was kept. */
export const gainSets = pgTable(
  'gain_sets',
  {
    orgId: orgId(),
    id: uuid('id').notNull().defaultRandom(),
    axisId: uuid('axis_id').notNull(),
    version: integer('version').notNull(),
    loadCases: json<{ name: string; plant: StoredPlant }[]>('load_cases').notNull(),
    controller: json<IdealController>('controller').notNull(),
    convention: json<Convention>('convention').notNull(),
    deviceRows: json<DeviceRow[]>('device_rows').notNull(),
    rule: text('rule'),
    settings: json<KeptSettings>('settings'),
    requirement: json<Requirement>('requirement').notNull(),
    actuator: json<Actuator>('actuator').notNull(),
    sampleTimeS: doublePrecision('sample_time_s'),
    checks: json<KeptCheck[]>('checks').notNull(),
    worstCase: text('worst_case').notNull(),
    verdict: json<Verdict>('verdict').notNull(),
    engines: json<Record<string, string>>('engines').notNull(),
    reason: text('reason').notNull(),
    /** SHA-256 over all that bears on the gains. */
    digest: text('digest').notNull(),
    createdBy: uuid('created_by').notNull(),
    createdByName: text('created_by_name').notNull(),
    createdAt: moment('created_at').notNull().defaultNow(),
  },
  (table) => [
    primaryKey({ columns: [table.orgId, table.id] }),
    unique('gain_sets_version').on(table.orgId, table.axisId, table.version),
    unique('gain_sets_of_axis').on(table.orgId, table.axisId, table.id),
    check('gain_sets_version_counts_from_1', sql`${table.version} > 0`),
    foreignKey({ columns: [table.orgId, table.axisId], foreignColumns: [axes.orgId, axes.id] }),
  ],
);
