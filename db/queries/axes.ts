import { and, asc, eq, gt, or } from 'drizzle-orm';
import type { Scope } from '../../lib/auth/scope';
import type { Transaction } from '../client';
import { axes, gainSets, loadCases, machines, type StoredPlant } from '../schema';

export type AxisRecord = Omit<typeof axes.$inferSelect, 'orgId' | 'createdAt'> & {
  readonly machine: {
    readonly id: string;
    readonly site: string;
    readonly name: string;
    readonly cautions: string;
  };
  readonly loadCases: readonly { readonly name: string; readonly plant: StoredPlant | null }[];
  readonly inService: { readonly id: string; readonly version: number; readonly since: Date | null } | null;
};

export async function getAxis(
  tx: Transaction,
  scope: Scope,
  params: { id: string },
): Promise<AxisRecord | null> {
  const [row] = await tx
    .select({
      axis: axes,
      machine: { id: machines.id, site: machines.site, name: machines.name, cautions: machines.cautions },
      version: gainSets.version,
    })
    .from(axes)
    .innerJoin(machines, and(eq(machines.orgId, axes.orgId), eq(machines.id, axes.machineId)))
    .leftJoin(gainSets, and(eq(gainSets.orgId, axes.orgId), eq(gainSets.id, axes.inServiceGainSetId)))
    .where(and(eq(axes.orgId, scope.orgId), eq(axes.id, params.id)));
  if (!row) return null;
  const cases = await tx
    .select({ name: loadCases.name, plant: loadCases.plant })
    .from(loadCases)
    .where(and(eq(loadCases.orgId, scope.orgId), eq(loadCases.axisId, params.id)))
    .orderBy(asc(loadCases.position));
  const { axis, machine, version } = row;
  const inService =
    axis.inServiceGainSetId === null || version === null
      ? null
      : { id: axis.inServiceGainSetId, version, since: axis.inServiceSince };
  return { ...axis, machine, loadCases: cases, inService };
}

export interface AxisListItem {
  readonly id: string;
  readonly machineId: string;
  readonly tag: string;
  readonly name: string;
  readonly measurementUnit: string;
  readonly outputUnit: string;
  readonly lastVersion: number;
  readonly version: number | null;
  readonly since: Date | null;
}

/** One page of axes by tag; `after` is the last tag and id of the page before. */
export async function listAxes(
  tx: Transaction,
  scope: Scope,
  params: { limit: number; after?: { tag: string; id: string }; machineId?: string },
): Promise<AxisListItem[]> {
  const { after, machineId } = params;
  return tx
    .select({
      id: axes.id,
      machineId: axes.machineId,
      tag: axes.tag,
      name: axes.name,
      measurementUnit: axes.measurementUnit,
      outputUnit: axes.outputUnit,
      lastVersion: axes.lastVersion,
      version: gainSets.version,
      since: axes.inServiceSince,
    })
    .from(axes)
    .leftJoin(gainSets, and(eq(gainSets.orgId, axes.orgId), eq(gainSets.id, axes.inServiceGainSetId)))
    .where(
      and(
        eq(axes.orgId, scope.orgId),
        machineId ? eq(axes.machineId, machineId) : undefined,
        after ? or(gt(axes.tag, after.tag), and(eq(axes.tag, after.tag), gt(axes.id, after.id))) : undefined,
      ),
    )
    .orderBy(asc(axes.tag), asc(axes.id))
    .limit(params.limit);
}
