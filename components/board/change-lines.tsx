import Link from 'next/link';
import type { ChangeState } from '@/lib/change';
import { day } from '../ui/date';
import { Tag, type Tone } from '../ui/notice';

export interface ChangeRow {
  id: string;
  number: number;
  state: ChangeState;
  tag: string;
  axisName: string;
  fromVersion: number | null;
  toVersion: number;
  reason: string;
  authorName: string;
  changedAt: Date;
  /** What is asked of the reader; the state is shown when nothing is. */
  task?: string;
}

const TONES: Partial<Record<ChangeState, Tone>> = {
  returned: 'care',
  'rolled-back': 'bad',
  withdrawn: 'care',
  verified: 'good',
  applied: 'good',
};

export function stateWords(state: ChangeState): string {
  return state.replace('-', ' ');
}

/** Changes one below the other: what, on which axis, why, and what is to be done. */
export function ChangeLines({ changes }: { changes: readonly ChangeRow[] }) {
  return (
    <div className="overflow-x-auto">
      <table className="ledger">
        <thead>
          <tr>
            <th scope="col">Change</th>
            <th scope="col">Axis</th>
            <th scope="col">What</th>
            <th scope="col">State</th>
          </tr>
        </thead>
        <tbody>
          {changes.map((change) => (
            <tr key={change.id}>
              <td className="figure whitespace-nowrap">
                <Link
                  className="link"
                  href={change.task === 'enter' ? `/sheet/${change.id}` : `/changes/${change.id}`}
                >
                  C-{String(change.number).padStart(4, '0')}
                </Link>
              </td>
              <td>
                {change.tag} {change.axisName}
              </td>
              <td>
                <span className="figure whitespace-nowrap">
                  {change.fromVersion === null ? 'first' : `v${change.fromVersion}`} → v{change.toVersion}
                </span>
                : {change.reason}
                <span className="block text-xs text-soft">
                  {change.authorName}, {day(change.changedAt)}
                </span>
              </td>
              <td>
                <Tag tone={TONES[change.state] ?? 'plain'}>{change.task ?? stateWords(change.state)}</Tag>
              </td>
            </tr>
          ))}
        </tbody>
      </table>
    </div>
  );
}
