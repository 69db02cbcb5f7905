import type { Metadata } from 'next';
import Link from 'next/link';
import { AxisTable } from '@/components/board/axis-table';
import { buttonClass } from '@/components/ui/button';
import { PageHead } from '@/components/ui/section';
import { listMachinesWithAxes } from '@/db/queries/machines';
import { withScope } from '@/db/tx';
import { requireSession } from '@/lib/auth/gate';
import { isPermitted } from '@/lib/auth/permissions';

export const metadata: Metadata = { title: 'Machines' };

export default async function MachinesPage() {
  const { scope, roles, organisation } = await requireSession();
  const machines = await withScope(scope, (tx) => listMachinesWithAxes(tx, scope));
  const mayEdit = isPermitted(roles, 'machine.edit');
  return (
    <>
      <PageHead
        path={organisation.name}
        title="Machines"
        aside={
          mayEdit ? (
            <Link className={buttonClass('primary')} href="/machines/new">
              Add a machine
            </Link>
          ) : null
        }
      />
      {machines.length === 0 ? <p className="pt-6 text-soft">No machine yet.</p> : null}
      {machines.map((machine) => (
        <section key={machine.id} className="border-b border-rule py-6 last:border-b-0">
          <header className="mb-2 flex flex-wrap items-baseline justify-between gap-3">
            <h2 className="text-lg">
              <Link className="link" href={`/machines/${machine.id}`}>
                {machine.name}
              </Link>{' '}
              <span className="text-sm font-normal text-soft">{machine.site}</span>
            </h2>
            {mayEdit ? (
              <Link className="link text-sm" href={`/machines/${machine.id}/axes/new`}>
                Add an axis
              </Link>
            ) : null}
          </header>
          <AxisTable axes={machine.axes} />
        </section>
      ))}
    </>
  );
}
