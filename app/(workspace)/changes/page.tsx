import type { Metadata } from 'next';
import Link from 'next/link';
import { ChangeLines } from '@/components/board/change-lines';
import { PageHead } from '@/components/ui/section';
import { listChanges } from '@/db/queries/changes';
import { withScope } from '@/db/tx';
import { requireSession } from '@/lib/auth/gate';

export const metadata: Metadata = { title: 'Changes' };

const PAGE = 50;

export default async function ChangesPage({ searchParams }: { searchParams: Promise<{ after?: string }> }) {
  const { scope, organisation } = await requireSession();
  const after = Number((await searchParams).after);
  const params = { limit: PAGE + 1, after: Number.isInteger(after) && after > 0 ? after : undefined };
  const changes = await withScope(scope, (tx) => listChanges(tx, scope, params));
  const shown = changes.slice(0, PAGE);
  return (
    <>
      <PageHead path={organisation.name} title="Changes" />
      <div className="pt-5">
        {shown.length > 0 ? (
          <ChangeLines changes={shown} />
        ) : (
          <p className="text-soft">No change yet. Keep a version on an axis’ worksheet and hand it over.</p>
        )}
        {changes.length > PAGE ? (
          <p className="mt-4">
            <Link className="link" href={`/changes?after=${shown[shown.length - 1].number}`}>
              Older changes
            </Link>
          </p>
        ) : null}
      </div>
    </>
  );
}
