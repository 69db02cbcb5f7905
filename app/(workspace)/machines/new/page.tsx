import type { Metadata } from 'next';
import Link from 'next/link';
import { MachineForm } from '@/components/forms/machine-form';
import { PageHead } from '@/components/ui/section';

export const metadata: Metadata = { title: 'Add a machine' };

export default function NewMachinePage() {
  return (
    <>
      <PageHead
        path={
          <Link className="link" href="/machines">
            Machines
          </Link>
        }
        title="Add a machine"
      />
      <MachineForm />
    </>
  );
}
