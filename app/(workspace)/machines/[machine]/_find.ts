import { getMachine, type MachineRecord } from '@/db/queries/machines';
import { withScope } from '@/db/tx';
import type { Scope } from '@/lib/auth/scope';
import { isId } from '@/lib/ids';

/** The machine of an address; null when the scope has none of it. */
export async function findMachine(scope: Scope, id: string): Promise<MachineRecord | null> {
  return isId(id) ? withScope(scope, (tx) => getMachine(tx, scope, { id })) : null;
}
