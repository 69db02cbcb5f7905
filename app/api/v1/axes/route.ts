import { listAxes, type AxisListItem } from '@/db/queries/axes';
import { withScope } from '@/db/tx';
import { FettleError } from '@/lib/errors';
import { endpoint } from '@/lib/http/endpoint';
import { pageAnswer, pageOf } from '@/lib/http/paging';
import { asId } from '@/lib/ids';
import { createAxis } from '@/lib/services/axes/create-axis';

function cursorOf({ tag, id }: AxisListItem): string {
  return Buffer.from(JSON.stringify([tag, id])).toString('base64url');
}

function readCursor(after: string | null): { tag: string; id: string } | undefined {
  if (after === null) return undefined;
  try {
    const [tag, id] = JSON.parse(Buffer.from(after, 'base64url').toString()) as unknown[];
    if (typeof tag === 'string' && typeof id === 'string') return { tag, id: asId(id, 'axis') };
  } catch {
    // falls through to the refusal below
  }
  throw new FettleError('MALFORMED', 'after is not a cursor of this list.');
}

function axisItem({ version, since, lastVersion, ...axis }: AxisListItem) {
  return { ...axis, lastVersion, inService: version === null ? null : { version, since } };
}

export const GET = endpoint({
  run: async ({ session: { scope }, query }) => {
    const { limit, after } = pageOf(query);
    const machine = query.get('machine');
    const machineId = machine === null ? undefined : asId(machine, 'machine');
    const params = { limit: limit + 1, after: readCursor(after), machineId };
    const rows = await withScope(scope, (tx) => listAxes(tx, scope, params));
    return pageAnswer(rows, limit, axisItem, cursorOf);
  },
});

export const POST = endpoint({
  status: 201,
  run: ({ session: { scope }, input }) => createAxis(scope, input),
});
