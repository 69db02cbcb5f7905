import type { Metadata, Viewport } from 'next';
import Link from 'next/link';
import { notFound } from 'next/navigation';
import { stateWords } from '@/components/board/change-lines';
import { conventionWords } from '@/components/gain-card/convention-words';
import { RollBack } from '@/components/technician/roll-back';
import { TechnicianSheet } from '@/components/technician/technician-sheet';
import type { SheetData } from '@/components/technician/types';
import { minute } from '@/components/ui/date';
import { Notice } from '@/components/ui/notice';
import { getChange, type ChangeRecord } from '@/db/queries/changes';
import { withScope } from '@/db/tx';
import { requireSession } from '@/lib/auth/gate';
import { permittedActions } from '@/lib/change';
import { cautionsOf } from '@/lib/http/change-answer';
import { isId } from '@/lib/ids';
import { changeName } from '@/lib/services/changes/content';

export const metadata: Metadata = { title: 'Sheet' };
export const viewport: Viewport = {
  width: 'device-width',
  initialScale: 1,
  interactiveWidget: 'resizes-content',
};

function sheetData(record: ChangeRecord): SheetData {
  const { change, axis, machine, from, to } = record;
  return {
    changeId: change.id,
    number: changeName(change.number),
    axis: {
      id: axis.id,
      tag: axis.tag,
      name: axis.name,
      path: `${machine.site} › ${machine.name} › ${axis.tag}`,
      deviceLabel: axis.deviceLabel,
    },
    rows: to.deviceRows.map(({ name, label, unit, direction, value, text, off }) => {
      const before = from?.deviceRows.find((row) => row.name === name);
      return {
        name,
        label,
        unit,
        direction,
        from: before?.value ?? null,
        fromText: before?.text ?? '–',
        to: value,
        toText: text,
        off,
      };
    }),
    form: conventionWords(to.convention),
    cautions: cautionsOf(record),
    test: change.test,
    wayBack: change.wayBack,
  };
}

function NotNow({ record }: { record: ChangeRecord }) {
  const { change } = record;
  return (
    <div className="mx-auto max-w-[520px] px-4 py-4">
      <Notice tone="care" title={`This change is ${stateWords(change.state)}.`}>
        There is nothing to enter for you now.
      </Notice>
      <p className="mt-4">
        <Link className="link" href={`/changes/${change.id}`}>
          To the change record
        </Link>
      </p>
    </div>
  );
}

export default async function SheetPage({
  params,
  searchParams,
}: {
  params: Promise<{ change: string }>;
  searchParams: Promise<{ back?: string }>;
}) {
  const { scope, roles, person, organisation } = await requireSession();
  const { change: id } = await params;
  const wantsBack = (await searchParams).back !== undefined;
  const record = isId(id) ? await withScope(scope, (tx) => getChange(tx, scope, { id })) : null;
  if (!record) notFound();
  const { change, axis, from, to, machine } = record;
  const isAuthor = change.authorId === person.id;
  const actions = permittedActions({
    state: change.state,
    roles,
    isAuthor,
    onePersonShop: organisation.onePersonShop,
  });
  const named = change.technicianId === null || change.technicianId === person.id;
  const sheet = sheetData(record);
  const found = record.reports.find(({ kind }) => kind === 'apply')?.asFound ?? null;
  return (
    <main>
      <header className="mx-auto max-w-[520px] px-4 pt-4">
        <p className="text-sm">
          Change {sheet.number} · {from ? `v${from.version}` : 'first'} → v{to.version}
          {change.temporaryUntil ? ` · valid until ${minute(change.temporaryUntil)}` : ''}
        </p>
        <h1 className="text-2xl">
          {axis.tag} {axis.name}
        </h1>
        <p>
          {machine.site} › {machine.name}
        </p>
      </header>
      {wantsBack && actions.includes('roll-back') ? (
        <RollBack sheet={sheet} found={found} />
      ) : actions.includes('apply') && named ? (
        <TechnicianSheet sheet={sheet} />
      ) : (
        <NotNow record={record} />
      )}
    </main>
  );
}
