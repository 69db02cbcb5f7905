import type { Scope } from '../../lib/auth/scope';
import { applyChange } from '../../lib/services/changes/apply-change';
import { approveChange } from '../../lib/services/changes/approve-change';
import { createChange } from '../../lib/services/changes/create-change';
import { issueChange } from '../../lib/services/changes/issue-change';
import { readChange } from '../../lib/services/changes/read-change';
import { submitChange } from '../../lib/services/changes/submit-change';
import { verifyChange } from '../../lib/services/changes/verify-change';
import type { SeededAxis } from './plant';

export interface SeedCast {
  readonly engineer: Scope;
  readonly approver: Scope;
  readonly technician: Scope;
  readonly password: string;
}

export type SeedState = 'draft' | 'submitted' | 'approved' | 'issued' | 'applied' | 'verified';

const ORDER: readonly SeedState[] = ['draft', 'submitted', 'approved', 'issued', 'applied', 'verified'];

export interface SeedWords {
  readonly reason: string;
  readonly risk?: string;
  readonly test?: string;
  readonly deviceLabel?: string;
}

/** A change to the given version, taken through its steps up to a state by the people who may take them. */
export async function seedChange(
  cast: SeedCast,
  axis: SeededAxis,
  version: number,
  state: SeedState,
  words: SeedWords,
): Promise<string> {
  const reached = (wanted: SeedState) => ORDER.indexOf(state) >= ORDER.indexOf(wanted);
  const { id } = await createChange(cast.engineer, {
    axisId: axis.axisId,
    gainSetId: axis.gainSetIds[version - 1],
    reason: words.reason,
    risk: words.risk ?? 'Swinging at first; nothing moves that could reach a person.',
    test:
      words.test ?? 'Step the set-point by 5 % of its range. Record ten minutes. Stop when the swing grows.',
    wayBack: 'Enter the as-found values again and save them.',
    safetyFunction: 'no',
  });
  if (reached('submitted')) await submitChange(cast.engineer, id);
  if (reached('approved')) await approveChange(cast.approver, id, { password: cast.password });
  if (reached('issued')) await issueChange(cast.approver, id, {});
  if (reached('applied')) {
    const { from, to } = await readChange(cast.engineer, id);
    const valuesOf = (rows: typeof to.deviceRows) =>
      Object.fromEntries(rows.map(({ name, value }) => [name, value]));
    await applyChange(cast.technician, id, {
      cautionsAcknowledged: true,
      identity: { deviceLabel: words.deviceLabel ?? 'as on the door' },
      asFound: valuesOf((from ?? to).deviceRows),
      asLeft: valuesOf(to.deviceRows),
      saved: 'yes',
    });
  }
  if (reached('verified'))
    await verifyChange(cast.technician, id, { result: 'pass', remark: 'Came in as predicted.' });
  return id;
}
