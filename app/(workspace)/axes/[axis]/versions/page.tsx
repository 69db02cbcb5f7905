import type { Metadata } from 'next';
import Link from 'next/link';
import { notFound } from 'next/navigation';
import { day } from '@/components/ui/date';
import { PageHead } from '@/components/ui/section';
import { CompareForm } from '@/components/versions/compare-form';
import { DifferenceTable } from '@/components/versions/difference-table';
import {
  getGainSetByVersion,
  listGainSets,
  type GainSetLine,
  type GainSetRecord,
} from '@/db/queries/gain-sets';
import { withScope } from '@/db/tx';
import { requireSession } from '@/lib/auth/gate';
import { findAxis } from '../_find';

export const metadata: Metadata = { title: 'Versions' };

const PAGE = 100;

function asVersion(text: string | undefined): number | null {
  const value = Number(text);
  return Number.isInteger(value) && value > 0 ? value : null;
}

function held({ verdict }: GainSetLine): string {
  if (verdict.pass === null) return 'none stated';
  const passed = verdict.items.filter(({ pass }) => pass).length;
  return `${verdict.pass ? '✓' : '✕'} ${passed} of ${verdict.items.length}`;
}

function VersionTable({
  versions,
  inService,
}: {
  versions: readonly GainSetLine[];
  inService: number | undefined;
}) {
  return (
    <div className="overflow-x-auto">
      <table className="ledger">
        <thead>
          <tr>
            <th scope="col" className="right">
              Version
            </th>
            <th scope="col">Gains, as the device wants them</th>
            <th scope="col">Limits held</th>
            <th scope="col">Reason</th>
            <th scope="col">Kept by</th>
          </tr>
        </thead>
        <tbody>
          {versions.map((row) => (
            <tr key={row.id} data-version={row.version}>
              <td className="figure right whitespace-nowrap">
                v{row.version}
                {row.version === inService ? (
                  <span className="block text-xs text-soft">in service</span>
                ) : null}
              </td>
              <td className="text-sm">
                {row.deviceRows.map(({ name, label, text, unit, isOff }) => (
                  <span key={name} className="block whitespace-nowrap">
                    {label} <span className="font-mono font-semibold">{text}</span> {isOff ? '(off)' : unit}
                  </span>
                ))}
              </td>
              <td className="whitespace-nowrap">{held(row)}</td>
              <td>{row.reason}</td>
              <td className="text-sm">
                {row.createdByName}
                <span className="block text-soft">{day(row.createdAt)}</span>
              </td>
            </tr>
          ))}
        </tbody>
      </table>
    </div>
  );
}

export default async function VersionsPage({
  params,
  searchParams,
}: {
  params: Promise<{ axis: string }>;
  searchParams: Promise<{ from?: string; to?: string }>;
}) {
  const { scope } = await requireSession();
  const axis = await findAxis(scope, (await params).axis);
  if (!axis) notFound();
  const query = await searchParams;
  const { versions, pair } = await withScope(scope, async (tx) => {
    const rows = await listGainSets(tx, scope, { axisId: axis.id, limit: PAGE });
    const from = asVersion(query.from) ?? rows[1]?.version ?? null;
    const to = asVersion(query.to) ?? rows[0]?.version ?? null;
    const load = (version: number | null): Promise<GainSetRecord | null> =>
      version === null ? Promise.resolve(null) : getGainSetByVersion(tx, scope, { axisId: axis.id, version });
    return { versions: rows, pair: { from: await load(from), to: await load(to) } };
  });
  return (
    <>
      <PageHead
        path={
          <Link className="link" href={`/axes/${axis.id}`}>
            {axis.tag} {axis.name}
          </Link>
        }
        title="Versions"
      />
      <div className="pt-5">
        {versions.length === 0 ? <p className="text-soft">Nothing is kept yet.</p> : null}
        {versions.length > 0 ? (
          <VersionTable versions={versions} inService={axis.inService?.version} />
        ) : null}
        {pair.from && pair.to ? (
          <section className="mt-8" aria-labelledby="differs">
            <h2 id="differs" className="mb-2 text-lg">
              What differs
            </h2>
            <CompareForm
              versions={versions.map(({ version }) => version)}
              from={pair.from.version}
              to={pair.to.version}
            />
            <DifferenceTable from={pair.from} to={pair.to} />
          </section>
        ) : null}
      </div>
    </>
  );
}
