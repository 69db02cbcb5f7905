import { and, asc, eq } from 'drizzle-orm';
import type { Scope } from '../../lib/auth/scope';
import type { Transaction } from '../client';
import { axes, gainSets, machines } from '../schema';

/** An axis in a list: its name, and how its version in service stands. */
export interface AxisLine {
  readonly id: string;
  readonly machineId: string;
  readonly tag: string;
  readonly name: string;
  readonly lastVersion: number;
  readonly inService: { readonly version: number; readonly since: Date | null } | null;
  /** Null when nothing is in service or no limit is stated. */
  readonly pass: boolean | null;
  readonly held: number;
  readonly limits: number;
}

export interface MachineWithAxes {
  readonly id: string;
  readonly site: string;
  readonly name: string;
  readonly axes: readonly AxisLine[];
}

const lineColumns = {
  id: axes.id,
  machineId: axes.machineId,
  tag: axes.tag,
  name: axes.name,
  lastVersion: axes.lastVersion,
  since: axes.inServiceSince,
  version: gainSets.version,
  verdict: gainSets.verdict,
};

export async function listMachinesWithAxes(tx: Transaction, scope: Scope): Promise<MachineWithAxes[]> {
  const rows = await tx
    .select({ id: machines.id, site: machines.site, name: machines.name })
    .from(machines)
    .where(eq(machines.orgId, scope.orgId))
    .orderBy(asc(machines.site), asc(machines.name));
  const lines = await tx
    .select(lineColumns)
    .from(axes)
    .leftJoin(gainSets, and(eq(gainSets.orgId, axes.orgId), eq(gainSets.id, axes.inServiceGainSetId)))
    .where(eq(axes.orgId, scope.orgId))
    .orderBy(asc(axes.tag));
  return rows.map((machine) => ({
    ...machine,
    axes: lines
      .filter(({ machineId }) => machineId === machine.id)
      .map(({ version, since, verdict, ...line }) => ({
        ...line,
        inService: version === null ? null : { version, since },
        pass: verdict?.pass ?? null,
        held: verdict?.items.filter(({ pass }) => pass).length ?? 0,
        limits: verdict?.items.length ?? 0,
      })),
  }));
}

export type MachineRecord = Omit<typeof machines.$inferSelect, 'orgId' | 'createdAt'>;

export async function getMachine(
  tx: Transaction,
  scope: Scope,
  params: { id: string },
): Promise<MachineRecord | null> {
  const { id, site, name, cautions, rowVersion } = machines;
  const [row] = await tx
    .select({ id, site, name, cautions, rowVersion })
    .from(machines)
    .where(and(eq(machines.orgId, scope.orgId), eq(machines.id, params.id)));
  return row ?? null;
}
