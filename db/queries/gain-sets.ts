import { and, desc, eq } from 'drizzle-orm';
import type { Scope } from '../../lib/auth/scope';
import type { Transaction } from '../client';
import { gainSets } from '../schema';
import { before, LARGEST_INTEGER } from './cursor';

export type GainSetRecord = Omit<typeof gainSets.$inferSelect, 'orgId'>;

export type GainSetLine = Pick<
  GainSetRecord,
  | 'id'
  | 'version'
  | 'rule'
  | 'controller'
  | 'deviceRows'
  | 'reason'
  | 'createdByName'
  | 'createdAt'
  | 'verdict'
  | 'worstCase'
>;

/** Versions of an axis, newest first; `after` is the last version number of the page before. */
export async function listGainSets(
  tx: Transaction,
  scope: Scope,
  params: { axisId: string; limit: number; after?: number },
): Promise<GainSetLine[]> {
  const { id, version, rule, controller, deviceRows, reason, createdByName, createdAt, verdict, worstCase } =
    gainSets;
  return tx
    .select({
      id,
      version,
      rule,
      controller,
      deviceRows,
      reason,
      createdByName,
      createdAt,
      verdict,
      worstCase,
    })
    .from(gainSets)
    .where(
      and(
        eq(gainSets.orgId, scope.orgId),
        eq(gainSets.axisId, params.axisId),
        before(gainSets.version, params.after),
      ),
    )
    .orderBy(desc(gainSets.version))
    .limit(params.limit);
}

export async function getGainSet(
  tx: Transaction,
  scope: Scope,
  params: { id: string },
): Promise<GainSetRecord | null> {
  const [row] = await tx
    .select()
    .from(gainSets)
    .where(and(eq(gainSets.orgId, scope.orgId), eq(gainSets.id, params.id)));
  return row ?? null;
}

export async function getGainSetByVersion(
  tx: Transaction,
  scope: Scope,
  params: { axisId: string; version: number },
): Promise<GainSetRecord | null> {
  if (params.version > LARGEST_INTEGER) return null;
  const [row] = await tx
    .select()
    .from(gainSets)
    .where(
      and(
        eq(gainSets.orgId, scope.orgId),
        eq(gainSets.axisId, params.axisId),
        eq(gainSets.version, params.version),
      ),
    );
  return row ?? null;
}
