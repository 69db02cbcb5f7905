import { and, eq, sql } from 'drizzle-orm';
import { axes, gainSets } from '../../../db/schema';
import { withScope } from '../../../db/tx';
import { emitAudit } from '../../audit/emit';
import { gainSetDigest } from '../../audit/digest';
import { authorise } from '../../auth/permissions';
import { personOf, type Scope } from '../../auth/scope';
import { toDevice } from '../../control/forms';
import { FettleError, notFound } from '../../errors';
import { asId } from '../../ids';
import { keepGainSetInput, type KeepGainSetInput } from '../../schemas/gain-set';
import { loadCasesOf, type LoadCaseInput } from '../../schemas/loop';
import { ENGINE_VERSIONS } from '../../sim/versions';
import { storedCase, writeLoadCases } from '../axes/write-load-cases';
import { parseInput } from '../parse-input';
import { checkLoadCases, keptCheck, type LoadCaseChecks } from './check-load-cases';

export interface KeptGainSet {
  readonly id: string;
  readonly version: number;
  readonly checks: LoadCaseChecks;
}

type AxisRow = typeof axes.$inferSelect;

async function findAxis(scope: Scope, axisId: string): Promise<AxisRow> {
  const [axis] = await withScope(scope, (tx) =>
    tx
      .select()
      .from(axes)
      .where(and(eq(axes.orgId, scope.orgId), eq(axes.id, axisId))),
  );
  if (!axis) throw notFound('axis');
  return axis;
}

/** Everything that the version will say, computed before the transaction so that no lock waits for arithmetic. */
function workOut(axis: AxisRow, cases: LoadCaseInput[], input: KeepGainSetInput) {
  const { controller, actuator = {}, sampleTime } = input;
  const requirement = input.requirement ?? axis.requirement;
  const checks = checkLoadCases(cases, controller, requirement, { actuator, sampleTimeS: sampleTime });
  const unstable = checks.checks.find(({ check }) => !check.stable);
  if (unstable)
    throw new FettleError(
      'INVALID',
      `The loop is unstable with load case “${unstable.name}”; unstable gains are not kept.`,
    );
  const device = toDevice(controller, axis.convention, {
    input: axis.measurementUnit,
    output: axis.outputUnit,
  });
  if (!device.ok) throw new FettleError('INVALID', device.message);
  const content = {
    loadCases: cases.map(storedCase),
    controller,
    convention: axis.convention,
    deviceRows: [...device.value.rows],
    rule: input.rule ?? null,
    settings: input.settings ?? null,
    requirement,
    actuator,
    sampleTimeS: sampleTime ?? null,
    checks: checks.checks.map(({ name, check }) => keptCheck(name, check)),
    worstCase: checks.worst.name,
    verdict: checks.verdict,
    engines: ENGINE_VERSIONS,
    reason: input.reason,
  };
  return { checks, content };
}

/**
 * Keeps gains as the next version of an axis. The server computes the check itself, with both engines; the number
 * comes from the axis' row under its lock, so that there is never a gap nor a double.
 *
 * @throws FettleError FORBIDDEN, MALFORMED, NOT_FOUND, INVALID for an unstable loop or gains that the device's form can't
 *   carry, or CONFLICT when the axis was edited while the check was being computed
 */
export async function keepGainSet(scope: Scope, axisId: string, input: unknown): Promise<KeptGainSet> {
  const permitted = authorise(scope, 'gain-set.keep');
  const person = personOf(scope);
  const axis = await findAxis(scope, asId(axisId, 'axis'));
  const parsed = parseInput(keepGainSetInput, input);
  const cases = loadCasesOf(parsed) ?? [];
  const { checks, content } = workOut(axis, cases, parsed);
  return withScope(scope, async (tx) => {
    const [next] = await tx
      .update(axes)
      .set({ lastVersion: sql`${axes.lastVersion} + 1`, requirement: content.requirement })
      .where(and(eq(axes.orgId, scope.orgId), eq(axes.id, axis.id), eq(axes.rowVersion, axis.rowVersion)))
      .returning({ version: axes.lastVersion });
    if (!next)
      throw new FettleError(
        'CONFLICT',
        'Someone edited this axis while its gains were being checked. Load it again and keep them then.',
      );
    const { version } = next;
    const [row] = await tx
      .insert(gainSets)
      .values({
        orgId: scope.orgId,
        axisId: axis.id,
        version,
        ...content,
        digest: gainSetDigest({ axisId: axis.id, version, ...content }),
        createdBy: person.id,
        createdByName: person.name,
      })
      .returning({ id: gainSets.id, digest: gainSets.digest });
    await writeLoadCases(tx, scope, axis.id, content.loadCases);
    await emitAudit(tx, permitted, {
      action: 'keep',
      subjectKind: 'gain-set',
      subjectId: row.id,
      detail: { axisId: axis.id, version, digest: row.digest, reason: parsed.reason },
    });
    return { id: row.id, version, checks };
  });
}
