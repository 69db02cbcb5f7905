import type { AxisUnits, Convention, DeviceRow } from '@/lib/control/forms';
import type { Plant, IdealController } from '@/lib/control/types';
import type { Requirement } from '@/lib/requirement';

/** A kept version as far as the worksheet needs it. */
export interface KeptVersion {
  id: string;
  version: number;
  controller: IdealController;
  rows: readonly DeviceRow[];
}

export interface OpenChange {
  id: string;
  number: string;
  state: string;
  toVersion: number;
}

/** All that the page hands to the worksheet of one axis. */
export interface WorksheetAxis {
  id: string;
  tag: string;
  name: string;
  machine: { id: string; name: string };
  units: AxisUnits;
  convention: Convention;
  actuator: { low?: number; high?: number; slew?: number };
  sampleTimeS?: number;
  requirement: Requirement;
  loadCases: readonly { name: string; plant: Plant | null; text: string }[];
  lastVersion: number;
  lastKept: KeptVersion | null;
  /** How the last version was made, so that the page opens where it was left. */
  lastSettings: { rule: string | null; settings: Readonly<Record<string, unknown>> | null } | null;
  inService: (KeptVersion & { since: string }) | null;
  openChanges: readonly OpenChange[];
  may: { keep: boolean; handOver: boolean };
}
