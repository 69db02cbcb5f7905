import { getChange, type ChangeRecord } from '../../../db/queries/changes';
import { withScope } from '../../../db/tx';
import type { Scope } from '../../auth/scope';
import { notFound } from '../../errors';
import { asId } from '../../ids';

/** One change with its whole record. @throws FettleError NOT_FOUND */
export async function readChange(scope: Scope, id: string): Promise<ChangeRecord> {
  const found = await withScope(scope, (tx) => getChange(tx, scope, { id: asId(id, 'change') }));
  if (!found) throw notFound('change');
  return found;
}
