import type { Metadata } from 'next';
import { minute } from '@/components/ui/date';
import { Notice } from '@/components/ui/notice';
import { PageHead } from '@/components/ui/section';
import { countWaitingLetters, listInbox } from '@/db/queries/records';
import { withScope } from '@/db/tx';
import { requireSession } from '@/lib/auth/gate';
import { isPermitted } from '@/lib/auth/permissions';

export const metadata: Metadata = { title: 'Letters' };

export default async function InboxPage() {
  const { scope, roles, organisation } = await requireSession();
  if (!isPermitted(roles, 'inbox.read'))
    return (
      <>
        <PageHead path={organisation.name} title="Letters" />
        <div className="pt-5">
          <Notice tone="care" title="Not for you to read.">
            To read the local inbox one must be admin.
          </Notice>
        </div>
      </>
    );
  const { letters, waiting } = await withScope(scope, async (tx) => ({
    letters: await listInbox(tx, scope, { limit: 100 }),
    waiting: await countWaitingLetters(tx, scope),
  }));
  return (
    <>
      <PageHead
        path={organisation.name}
        title="Letters"
        aside={
          <span className="text-sm text-soft">
            {waiting === 0 ? 'none waiting to be sent' : `${waiting} waiting to be sent`}
          </span>
        }
      />
      <p className="pt-4 text-soft">
        Letters sent from here land in this local inbox until a mail service is set (SMTP_URL). The newest
        comes first.
      </p>
      {letters.length === 0 ? <p className="pt-4">Nothing was sent yet.</p> : null}
      <ul className="m-0 mt-4 list-none p-0">
        {letters.map((letter) => (
          <li key={letter.id} className="border-b border-rule py-3" data-letter>
            <div className="flex flex-wrap items-baseline justify-between gap-3">
              <strong>{letter.subject}</strong>
              <span className="figure text-sm text-soft">{minute(letter.receivedAt)}</span>
            </div>
            <div className="text-sm text-soft">to {letter.toEmail}</div>
            <pre className="mt-1 font-sans text-sm whitespace-pre-wrap">{letter.body}</pre>
          </li>
        ))}
      </ul>
    </>
  );
}
