import type { ReactNode } from 'react';
import { Spine, type SpineGroup, type SpineLink } from '@/components/shell/spine';
import { SignOut } from '@/components/shell/sign-out';
import { listChanges } from '@/db/queries/changes';
import { listMachinesWithAxes, type AxisLine } from '@/db/queries/machines';
import { withScope } from '@/db/tx';
import { requireSession } from '@/lib/auth/gate';
import { isPermitted } from '@/lib/auth/permissions';
import type { Session } from '@/lib/auth/session';
import { waitingFor } from './_waiting';

function axisEnd({ pass, held, limits, inService }: AxisLine): SpineLink['end'] {
  if (!inService) return { text: '–', words: 'nothing in service' };
  if (pass === null) return { text: '–', words: 'no limit stated' };
  return pass
    ? { text: '✓', words: 'requirement met', tone: 'good' }
    : { text: `✕ ${limits - held}`, words: `${limits - held} limits not held`, tone: 'bad' };
}

function count(number: number, words: string): SpineLink['end'] {
  return number > 0 ? { text: String(number), words: `${number} ${words}` } : undefined;
}

async function spineGroups({ scope, roles, person }: Session): Promise<SpineGroup[]> {
  const { machines, changes } = await withScope(scope, async (tx) => ({
    machines: await listMachinesWithAxes(tx, scope),
    changes: await listChanges(tx, scope, {
      limit: 200,
      states: ['draft', 'submitted', 'returned', 'approved', 'issued', 'applied'],
    }),
  }));
  const waiting = waitingFor(changes, roles, person.id).length;
  const records: SpineLink[] = [
    ...(isPermitted(roles, 'audit.read') ? [{ href: '/audit', label: 'Audit log' }] : []),
    ...(isPermitted(roles, 'inbox.read') ? [{ href: '/inbox', label: 'Letters' }] : []),
  ];
  return [
    {
      links: [
        { href: '/', label: 'Board', end: count(waiting, 'wait for you') },
        { href: '/machines', label: 'Machines' },
        { href: '/changes', label: 'Changes', end: count(changes.length, 'open') },
        { href: '/people', label: 'People' },
        ...records,
      ],
    },
    ...machines.map(({ name, axes }) => ({
      title: name,
      links: axes.map((axis) => ({
        href: `/axes/${axis.id}`,
        label: `${axis.tag} ${axis.name}`,
        end: axisEnd(axis),
      })),
    })),
  ];
}

export default async function WorkspaceLayout({ children }: { children: ReactNode }) {
  const session = await requireSession();
  const { person, organisation, roles } = session;
  return (
    <div className="min-h-screen lg:grid lg:grid-cols-[232px_minmax(0,1fr)]">
      <a
        href="#main"
        className="sr-only focus:not-sr-only focus:absolute focus:z-50 focus:bg-sheet focus:p-3"
      >
        To the page
      </a>
      <Spine
        groups={await spineGroups(session)}
        foot={
          <div className="px-2 text-sm text-soft">
            <div>{person.name}</div>
            <div>
              {roles.join(', ')}, {organisation.name}
            </div>
            <SignOut />
          </div>
        }
      />
      <main id="main" className="min-w-0 px-4 pt-5 pb-16 lg:px-8">
        {children}
      </main>
    </div>
  );
}
