import type { Metadata } from 'next';
import Link from 'next/link';
import { minute } from '@/components/ui/date';
import { Notice } from '@/components/ui/notice';
import { PageHead } from '@/components/ui/section';
import { listAuditEvents } from '@/db/queries/records';
import { withScope } from '@/db/tx';
import { verifyAudit } from '@/lib/audit/verify';
import { requireSession } from '@/lib/auth/gate';
import { isPermitted } from '@/lib/auth/permissions';

export const metadata: Metadata = { title: 'Audit log' };

const PAGE = 100;

export default async function AuditPage({ searchParams }: { searchParams: Promise<{ after?: string }> }) {
  const { scope, roles, organisation } = await requireSession();
  if (!isPermitted(roles, 'audit.read'))
    return (
      <>
        <PageHead path={organisation.name} title="Audit log" />
        <div className="pt-5">
          <Notice tone="care" title="Not for you to read.">
            To read the audit log one must be engineer, approver or admin.
          </Notice>
        </div>
      </>
    );
  const after = Number((await searchParams).after);
  const params = { limit: PAGE + 1, after: Number.isInteger(after) && after > 0 ? after : undefined };
  const { rows, chain } = await withScope(scope, async (tx) => ({
    rows: await listAuditEvents(tx, scope, params),
    chain: await verifyAudit(tx, scope),
  }));
  const shown = rows.slice(0, PAGE);
  return (
    <>
      <PageHead path={organisation.name} title="Audit log" />
      <div className="pt-5">
        <Notice
          tone={chain.intact ? 'good' : 'bad'}
          title={chain.intact ? 'The chain is whole' : 'The chain is broken'}
        >
          {chain.intact
            ? `${chain.length} lines, each bound to those before it.`
            : `Line ${chain.firstBroken} is not as it was written.`}
        </Notice>
        <div className="mt-4 overflow-x-auto">
          <table className="ledger text-sm">
            <thead>
              <tr>
                <th scope="col" className="right">
                  Line
                </th>
                <th scope="col">When</th>
                <th scope="col">Who</th>
                <th scope="col">What</th>
                <th scope="col">Detail</th>
                <th scope="col">Hash</th>
              </tr>
            </thead>
            <tbody>
              {shown.map((row) => (
                <tr key={row.seq}>
                  <td className="figure right">{row.seq}</td>
                  <td className="figure whitespace-nowrap">{minute(row.at)}</td>
                  <td>{row.actorName}</td>
                  <td>
                    {row.action} {row.subjectKind}
                  </td>
                  <td className="max-w-md break-words">
                    <details>
                      <summary className="cursor-pointer">show</summary>
                      <code className="font-mono text-xs whitespace-pre-wrap">
                        {JSON.stringify(row.detail, null, 1)}
                      </code>
                    </details>
                  </td>
                  <td className="font-mono text-xs">{row.hash.slice(0, 12)}</td>
                </tr>
              ))}
            </tbody>
          </table>
        </div>
        {rows.length > PAGE ? (
          <p className="mt-4">
            <Link className="link" href={`/audit?after=${shown[shown.length - 1].seq}`}>
              Older lines
            </Link>
          </p>
        ) : null}
      </div>
    </>
  );
}
