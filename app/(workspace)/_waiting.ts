import type { ChangeLine } from '@/db/queries/changes';
import type { Role } from '@/lib/change';

export interface Waiting extends ChangeLine {
  /** What the person is asked to do, in a word or two. */
  readonly task: string;
}

function taskOf(change: ChangeLine, roles: readonly Role[], personId: string): string | null {
  const own = change.authorId === personId;
  switch (change.state) {
    case 'draft':
      return own ? 'submit' : null;
    case 'returned':
      return own ? 'answer' : null;
    case 'submitted':
      return roles.includes('approver') && !own ? 'sign' : null;
    case 'approved':
      return roles.includes('approver') || own ? 'issue' : null;
    case 'issued':
      return roles.includes('technician') && (change.technicianId ?? personId) === personId ? 'enter' : null;
    case 'applied':
      return roles.includes('technician') || own ? 'test' : null;
    default:
      return null;
  }
}

/** The open changes that wait for this person, with what is asked. */
export function waitingFor(
  changes: readonly ChangeLine[],
  roles: readonly Role[],
  personId: string,
): Waiting[] {
  return changes.flatMap((change) => {
    const task = taskOf(change, roles, personId);
    return task ? [{ ...change, task }] : [];
  });
}
