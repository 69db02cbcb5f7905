import type { Metadata } from 'next';
import Link from 'next/link';
import { notFound } from 'next/navigation';
import { stateWords } from '@/components/board/change-lines';
import { ChangeSteps } from '@/components/change/change-steps';
import { EventList } from '@/components/change/event-list';
import { ReportList } from '@/components/change/report-list';
import { VerdictPair } from '@/components/change/verdict-pair';
import { conventionWords } from '@/components/gain-card/convention-words';
import { recordRows, RecordSheet } from '@/components/record-sheet/record-sheet';
import { day } from '@/components/ui/date';
import { Tag } from '@/components/ui/notice';
import { PageHead } from '@/components/ui/section';
import { getChange, type ChangeRecord } from '@/db/queries/changes';
import { listPeople } from '@/db/queries/people';
import { withScope } from '@/db/tx';
import { verifyChangeEvents } from '@/lib/audit/verify';
import { requireSession } from '@/lib/auth/gate';
import { permittedActions, signatureMeaning } from '@/lib/change';
import { isId } from '@/lib/ids';
import { changeName } from '@/lib/services/changes/content';

export const metadata: Metadata = { title: 'Change record' };

const SAFETY = { no: 'no', yes: 'yes', unknown: 'not known' };

function Words({ record }: { record: ChangeRecord }) {
  const { change, technicianName } = record;
  const rows: [string, string][] = [
    ['Reason', change.reason],
    ['Risk', change.risk || 'none stated'],
    ['Test to run', change.test || 'none stated'],
    ['Way back', change.wayBack || 'enter the as-found values again'],
    [
      'Part of a safety function',
      `${SAFETY[change.safetyFunction]}${change.siteReference ? `; site reference ${change.siteReference}` : ''}`,
    ],
    ['Until', change.temporaryUntil ? `temporary, until ${day(change.temporaryUntil)}` : 'permanent'],
    ...(change.state === 'issued'
      ? ([['Issued to', technicianName ?? 'any technician']] as [string, string][])
      : []),
  ];
  return (
    <dl className="mt-5 grid gap-x-6 gap-y-2 sm:grid-cols-[170px_1fr]">
      {rows.map(([term, text]) => (
        <div key={term} className="contents">
          <dt className="text-soft">{term}</dt>
          <dd className="m-0 whitespace-pre-line">{text}</dd>
        </div>
      ))}
    </dl>
  );
}

export default async function ChangePage({ params }: { params: Promise<{ change: string }> }) {
  const { scope, roles, person, organisation } = await requireSession();
  const { change: id } = await params;
  const record = isId(id) ? await withScope(scope, (tx) => getChange(tx, scope, { id })) : null;
  if (!record) notFound();
  const { technicians, chain } = await withScope(scope, async (tx) => ({
    chain: await verifyChangeEvents(tx, scope, record.change.id),
    technicians: await listPeople(tx, scope, { role: 'technician' }),
  }));
  const { change, axis, machine, from, to, events, reports } = record;
  const { onePersonShop } = organisation;
  const isAuthor = change.authorId === person.id;
  const actions = permittedActions({ state: change.state, roles, isAuthor, onePersonShop });
  const fromLabel = from ? `v${from.version}` : 'none';
  return (
    <>
      <PageHead
        path={
          <>
            <Link className="link" href={`/machines/${machine.id}`}>
              {machine.name}
            </Link>{' '}
            /{' '}
            <Link className="link" href={`/axes/${axis.id}`}>
              {axis.tag} {axis.name}
            </Link>
          </>
        }
        title={
          <span className="figure">
            {changeName(change.number)}: {from ? fromLabel : 'first version'} → v{to.version}
          </span>
        }
        aside={<Tag tone="plain">{stateWords(change.state)}</Tag>}
      />
      <div className="grid grid-cols-1 gap-x-9 gap-y-8 pt-5 xl:grid-cols-[minmax(0,3fr)_minmax(0,2fr)]">
        <div className="min-w-0">
          <h2 className="mb-1 text-lg">What changes</h2>
          <p className="mb-2 text-sm text-soft">As the device wants it: {conventionWords(to.convention)}</p>
          <RecordSheet
            rows={recordRows(from?.deviceRows ?? null, to.deviceRows)}
            fromLabel={fromLabel}
            toLabel={`v${to.version}`}
          />
          <Words record={record} />
          <h2 className="mt-8 mb-1 text-lg">Requirement, before and after</h2>
          <VerdictPair
            before={from}
            after={to}
            units={{ input: axis.measurementUnit, output: axis.outputUnit }}
          />
          {reports.length > 0 ? (
            <>
              <h2 className="mt-8 mb-2 text-lg">From the machine</h2>
              <ReportList reports={reports} rows={to.deviceRows} />
            </>
          ) : null}
        </div>
        <div className="min-w-0">
          <h2 className="mb-2 text-lg">What you can do</h2>
          <ChangeSteps
            key={change.state}
            changeId={change.id}
            actions={actions}
            approvalMeaning={signatureMeaning('approve') ?? ''}
            technicians={technicians.map(({ id: personId, name }) => ({ id: personId, name }))}
          />
          <h2 className="mt-8 mb-1 text-lg">Steps so far</h2>
          <EventList events={events} />
          {chain ? (
            <p className={`mt-2 text-sm ${chain.intact ? 'text-soft' : 'font-semibold text-brick'}`}>
              {chain.intact
                ? 'Every step is bound to those before it; the chain is whole.'
                : `✕ The chain is broken at step ${chain.firstBroken}.`}
            </p>
          ) : null}
          {onePersonShop ? (
            <p className="mt-3 text-sm">
              This organisation is a one-person shop: author and approver may be the same.
            </p>
          ) : null}
          <p className="mt-3 text-xs text-soft">
            Content hash <span className="font-mono break-all">{change.contentHash}</span>
          </p>
        </div>
      </div>
    </>
  );
}
