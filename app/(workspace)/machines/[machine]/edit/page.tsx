import type { Metadata } from 'next';
import Link from 'next/link';
import { notFound } from 'next/navigation';
import { MachineForm } from '@/components/forms/machine-form';
import { PageHead } from '@/components/ui/section';
import { requireSession } from '@/lib/auth/gate';
import { findMachine } from '../_find';

export const metadata: Metadata = { title: 'Edit a machine' };

export default async function EditMachinePage({ params }: { params: Promise<{ machine: string }> }) {
  const { scope } = await requireSession();
  const machine = await findMachine(scope, (await params).machine);
  if (!machine) notFound();
  return (
    <>
      <PageHead
        path={
          <Link className="link" href={`/machines/${machine.id}`}>
            {machine.name}
          </Link>
        }
        title="Edit the machine"
      />
      <MachineForm machine={machine} />
    </>
  );
}
