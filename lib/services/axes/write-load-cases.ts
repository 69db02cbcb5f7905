import { and, eq, notInArray } from 'drizzle-orm';
import type { Transaction } from '../../../db/client';
import { loadCases, type StoredPlant } from '../../../db/schema';
import type { Scope } from '../../auth/scope';
import { plantToText } from '../../control/plant-text';
import type { LoadCaseInput } from '../../schemas/loop';

export interface StoredCase {
  readonly name: string;
  readonly plant: StoredPlant;
}

/** A load case as it is stored: the plant as it was read, and as it was typed. */
export function storedCase({ name, plant: { plant, text } }: LoadCaseInput): StoredCase {
  return { name, plant: { ...plant, text: text ?? plantToText(plant) } };
}

/** Makes these the load cases of an axis, in this order; others are gone, those of the same name keep their id. */
export async function writeLoadCases(
  tx: Transaction,
  scope: Scope,
  axisId: string,
  cases: readonly StoredCase[],
): Promise<void> {
  const names = cases.map(({ name }) => name);
  const own = and(eq(loadCases.orgId, scope.orgId), eq(loadCases.axisId, axisId));
  await tx.delete(loadCases).where(and(own, notInArray(loadCases.name, names)));
  for (const [position, { name, plant }] of cases.entries())
    await tx
      .insert(loadCases)
      .values({ orgId: scope.orgId, axisId, name, position, plant })
      .onConflictDoUpdate({
        target: [loadCases.orgId, loadCases.axisId, loadCases.name],
        set: { position, plant },
      });
}
