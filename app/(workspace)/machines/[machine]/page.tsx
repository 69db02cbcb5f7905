import type { Metadata } from 'next';
import Link from 'next/link';
import { notFound } from 'next/navigation';
import { AxisTable } from '@/components/board/axis-table';
import { buttonClass } from '@/components/ui/button';
import { PageHead } from '@/components/ui/section';
import { listMachinesWithAxes } from '@/db/queries/machines';
import { withScope } from '@/db/tx';
import { requireSession } from '@/lib/auth/gate';
import { isPermitted } from '@/lib/auth/permissions';
import { findMachine } from './_find';

export const metadata: Metadata = { title: 'Machine' };

export default async function MachinePage({ params }: { params: Promise<{ machine: string }> }) {
  const { scope, roles } = await requireSession();
  const machine = await findMachine(scope, (await params).machine);
  if (!machine) notFound();
  const machines = await withScope(scope, (tx) => listMachinesWithAxes(tx, scope));
  const axes = machines.find(({ id }) => id === machine.id)?.axes ?? [];
  return (
    <>
      <PageHead
        path={
          <Link className="link" href="/machines">
            Machines
          </Link>
        }
        title={machine.name}
        aside={
          isPermitted(roles, 'machine.edit') ? (
            <>
              <Link className={buttonClass()} href={`/machines/${machine.id}/edit`}>
                Edit
              </Link>
              <Link className={buttonClass('primary')} href={`/machines/${machine.id}/axes/new`}>
                Add an axis
              </Link>
            </>
          ) : null
        }
      />
      <p className="pt-4 text-soft">{machine.site}</p>
      <div className="pt-4">
        <AxisTable axes={axes} />
      </div>
      <h2 className="mt-8 text-lg">Cautions of this machine</h2>
      <p className="mt-1 whitespace-pre-line">
        {machine.cautions || 'None of its own; the usual ones stand on every sheet.'}
      </p>
    </>
  );
}
