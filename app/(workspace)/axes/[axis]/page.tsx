import type { Metadata } from 'next';
import { notFound } from 'next/navigation';
import { stateWords } from '@/components/board/change-lines';
import { day } from '@/components/ui/date';
import type { KeptVersion, WorksheetAxis } from '@/components/worksheet/types';
import { Worksheet } from '@/components/worksheet/worksheet';
import type { AxisRecord } from '@/db/queries/axes';
import { listChanges } from '@/db/queries/changes';
import { getGainSet, getGainSetByVersion, type GainSetRecord } from '@/db/queries/gain-sets';
import { withScope } from '@/db/tx';
import { requireSession } from '@/lib/auth/gate';
import { isPermitted } from '@/lib/auth/permissions';
import type { Session } from '@/lib/auth/session';
import { changeName } from '@/lib/services/changes/content';
import { findAxis } from './_find';

export const metadata: Metadata = { title: 'Worksheet' };

function kept(record: GainSetRecord | null): KeptVersion | null {
  if (!record) return null;
  const { id, version, controller, deviceRows } = record;
  return { id, version, controller, rows: deviceRows };
}

async function worksheetAxis(axis: AxisRecord, { scope, roles }: Session): Promise<WorksheetAxis> {
  const { id, tag, name, machine, convention, requirement, lastVersion, loadCases } = axis;
  const { last, inService, open } = await withScope(scope, async (tx) => ({
    last: lastVersion > 0 ? await getGainSetByVersion(tx, scope, { axisId: id, version: lastVersion }) : null,
    inService: axis.inService ? await getGainSet(tx, scope, { id: axis.inService.id }) : null,
    open: await listChanges(tx, scope, {
      axisId: id,
      limit: 20,
      states: ['draft', 'submitted', 'returned', 'approved', 'issued', 'applied'],
    }),
  }));
  const running = kept(inService);
  const { since } = axis.inService ?? { since: null };
  return {
    id,
    tag,
    name,
    machine: { id: machine.id, name: machine.name },
    units: { input: axis.measurementUnit, output: axis.outputUnit },
    convention,
    actuator: {
      low: axis.actuatorLow ?? undefined,
      high: axis.actuatorHigh ?? undefined,
      slew: axis.actuatorSlew ?? undefined,
    },
    sampleTimeS: axis.sampleTimeS ?? undefined,
    requirement,
    loadCases: loadCases.map(({ name: caseName, plant }) => ({
      name: caseName,
      plant,
      text: plant?.text ?? '',
    })),
    lastVersion,
    lastKept: kept(last),
    lastSettings: last ? { rule: last.rule, settings: last.settings } : null,
    inService: running && { ...running, since: since ? day(since) : 'an unknown day' },
    openChanges: open.map(({ id: changeId, number, state, toVersion }) => ({
      id: changeId,
      number: changeName(number),
      state: stateWords(state),
      toVersion,
    })),
    may: { keep: isPermitted(roles, 'gain-set.keep'), handOver: isPermitted(roles, 'change.draft') },
  };
}

export default async function AxisPage({ params }: { params: Promise<{ axis: string }> }) {
  const session = await requireSession();
  const axis = await findAxis(session.scope, (await params).axis);
  if (!axis) notFound();
  return <Worksheet axis={await worksheetAxis(axis, session)} />;
}
