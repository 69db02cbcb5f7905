import type { Metadata } from 'next';
import Link from 'next/link';
import { AxisTable } from '@/components/board/axis-table';
import { ChangeLines } from '@/components/board/change-lines';
import { PageHead } from '@/components/ui/section';
import { minute } from '@/components/ui/date';
import { listRecentEvents } from '@/db/queries/board';
import { listChanges } from '@/db/queries/changes';
import { listMachinesWithAxes } from '@/db/queries/machines';
import { withScope } from '@/db/tx';
import { requireSession } from '@/lib/auth/gate';
import { changeName } from '@/lib/services/changes/content';
import { waitingFor } from './_waiting';

export const metadata: Metadata = { title: 'Board' };

const DONE: Record<string, string> = {
  draft: 'drafted',
  submit: 'submitted',
  approve: 'approved',
  return: 'returned',
  withdraw: 'withdrew',
  issue: 'issued',
  apply: 'applied',
  verify: 'verified',
  'roll-back': 'rolled back',
};

export default async function BoardPage() {
  const { scope, roles, person, organisation } = await requireSession();
  const { machines, changes, events } = await withScope(scope, async (tx) => ({
    machines: await listMachinesWithAxes(tx, scope),
    changes: await listChanges(tx, scope, { limit: 200 }),
    events: await listRecentEvents(tx, scope, { limit: 12 }),
  }));
  const waiting = waitingFor(changes, roles, person.id);
  const axes = machines.flatMap((machine) => machine.axes);
  const inService = axes.filter((axis) => axis.inService).length;
  return (
    <>
      <PageHead path={organisation.name} title="Board" />
      <div className="grid grid-cols-1 gap-x-9 gap-y-8 pt-6 xl:grid-cols-[minmax(0,5fr)_minmax(0,3fr)]">
        <div className="grid min-w-0 grid-cols-[minmax(0,1fr)] content-start gap-8">
          <section aria-labelledby="waits">
            <header className="mb-1 flex items-baseline justify-between">
              <h2 id="waits" className="text-lg">
                Waits for you
              </h2>
              <span className="figure text-sm text-soft">{waiting.length}</span>
            </header>
            {waiting.length > 0 ? (
              <ChangeLines changes={waiting} />
            ) : (
              <p className="text-soft">Nothing waits for you.</p>
            )}
          </section>
          <section aria-labelledby="axes" className="border-t border-rule pt-6">
            <header className="mb-1 flex items-baseline justify-between">
              <h2 id="axes" className="text-lg">
                Axes
              </h2>
              <span className="text-sm text-soft">
                {axes.length}, {inService} with a version in service
              </span>
            </header>
            <AxisTable axes={axes} />
          </section>
        </div>
        <section aria-labelledby="lately" className="min-w-0">
          <h2 id="lately" className="mb-1 text-lg">
            Lately
          </h2>
          <ul className="m-0 list-none p-0">
            {events.map((event) => (
              <li key={`${event.changeId}-${event.seq}`} className="border-b border-hair py-2 text-sm">
                <span className="figure block text-xs text-soft">{minute(event.at)}</span>
                <strong>{event.byName}</strong> {DONE[event.action] ?? event.action}{' '}
                <Link className="link" href={`/changes/${event.changeId}`}>
                  {changeName(event.number)}
                </Link>{' '}
                of {event.tag}
                {event.remark ? <>: “{event.remark}”</> : null}
              </li>
            ))}
          </ul>
        </section>
      </div>
    </>
  );
}
