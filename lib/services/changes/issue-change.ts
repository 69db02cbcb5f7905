import { and, arrayContains, eq, isNull } from 'drizzle-orm';
import { memberships, persons } from '../../../db/schema';
import type { Scope } from '../../auth/scope';
import { FettleError } from '../../errors';
import { issueInput } from '../../schemas/change';
import { parseInput } from '../parse-input';
import { requireBaseline } from './baseline';
import { takeStep, type StepContext } from './take-step';

async function requireTechnician({ tx }: StepContext, scope: Scope, technicianId: string): Promise<void> {
  const rows = await tx
    .select({ id: memberships.personId })
    .from(memberships)
    .innerJoin(persons, eq(persons.id, memberships.personId))
    .where(
      and(
        eq(memberships.orgId, scope.orgId),
        eq(memberships.personId, technicianId),
        arrayContains(memberships.roles, ['technician']),
        isNull(persons.deactivatedAt),
      ),
    );
  if (rows.length > 0) return;
  const message = 'That person is no technician of this organisation.';
  throw new FettleError('INVALID', message, { fields: [{ path: 'technicianId', message }] });
}

function requireSiteReference({ change }: StepContext): void {
  if (change.safetyFunction === 'no' || change.siteReference !== '') return;
  throw new FettleError(
    'INVALID',
    'The loop is, or may be, part of a safety function: the site’s own procedure comes first. Withdraw this change and draft it again with the reference of that procedure.',
  );
}

/** Issues an approved change to one technician, or to any. */
export async function issueChange(scope: Scope, id: string, input: unknown): Promise<void> {
  const { technicianId } = parseInput(issueInput, input);
  await takeStep(scope, id, {
    action: 'issue',
    set: { technicianId: technicianId ?? null },
    payload: technicianId ? { technicianId } : {},
    also: async (context) => {
      requireSiteReference(context);
      requireBaseline(context);
      if (technicianId) await requireTechnician(context, scope, technicianId);
    },
  });
}
