import { getAxis, type AxisRecord } from '@/db/queries/axes';
import { withScope } from '@/db/tx';
import type { Scope } from '@/lib/auth/scope';
import { isId } from '@/lib/ids';

/** The axis of an address; null when the scope has none of it. */
export async function findAxis(scope: Scope, id: string): Promise<AxisRecord | null> {
  return isId(id) ? withScope(scope, (tx) => getAxis(tx, scope, { id })) : null;
}
