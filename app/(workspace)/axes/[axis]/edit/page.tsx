import type { Metadata } from 'next';
import Link from 'next/link';
import { notFound } from 'next/navigation';
import { AxisForm } from '@/components/forms/axis-form';
import { PageHead } from '@/components/ui/section';
import { requireSession } from '@/lib/auth/gate';
import { conventionInput } from '@/lib/schemas/axis';
import { findAxis } from '../_find';

export const metadata: Metadata = { title: 'Edit an axis' };

export default async function EditAxisPage({ params }: { params: Promise<{ axis: string }> }) {
  const { scope } = await requireSession();
  const axis = await findAxis(scope, (await params).axis);
  if (!axis) notFound();
  const { id, tag, name, measurementUnit, outputUnit, deviceLabel, rowVersion } = axis;
  return (
    <>
      <PageHead
        path={
          <Link className="link" href={`/axes/${axis.id}`}>
            {axis.tag}
          </Link>
        }
        title="Edit the axis"
      />
      <AxisForm
        machineId={axis.machine.id}
        axis={{
          id,
          tag,
          name,
          measurementUnit,
          outputUnit,
          deviceLabel,
          rowVersion,
          actuatorLow: axis.actuatorLow ?? undefined,
          actuatorHigh: axis.actuatorHigh ?? undefined,
          actuatorSlew: axis.actuatorSlew ?? undefined,
          sampleTimeS: axis.sampleTimeS ?? undefined,
          convention: conventionInput.parse(axis.convention),
        }}
      />
    </>
  );
}
