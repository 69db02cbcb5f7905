import type { changes, gainSets } from '../../db/schema';
import { digestOf } from './hash';

type GainSet = typeof gainSets.$inferSelect;
type Change = typeof changes.$inferSelect;

/** What a version says: the gains, all that they were computed from, and the check that was shown. */
export function gainSetDigest(
  version: Omit<GainSet, 'orgId' | 'id' | 'digest' | 'createdBy' | 'createdByName' | 'createdAt'>,
): string {
  const { axisId, loadCases, controller, convention, deviceRows, rule, settings, requirement } = version;
  const { actuator, sampleTimeS, checks, worstCase, verdict, engines, reason } = version;
  return digestOf({
    axisId,
    version: version.version,
    loadCases,
    controller,
    convention,
    deviceRows,
    rule,
    settings,
    requirement,
    actuator,
    sampleTimeS,
    checks,
    worstCase,
    verdict,
    engines,
    reason,
  });
}

export type ChangeContent = Pick<
  Change,
  | 'number'
  | 'axisId'
  | 'reason'
  | 'risk'
  | 'test'
  | 'wayBack'
  | 'temporaryUntil'
  | 'safetyFunction'
  | 'siteReference'
>;

/** What a signature under a change stands for: the versions by their digests, and every word of the record. */
export function contentHash(change: ChangeContent, fromDigest: string | null, toDigest: string): string {
  const { number, axisId, reason, risk, test, wayBack, temporaryUntil, safetyFunction, siteReference } =
    change;
  return digestOf({
    number,
    axisId,
    reason,
    risk,
    test,
    wayBack,
    temporaryUntil: temporaryUntil?.toISOString() ?? null,
    safetyFunction,
    siteReference,
    from: fromDigest,
    to: toDigest,
  });
}
