import { minute } from '../ui/date';

export interface EventRow {
  seq: number;
  action: string;
  byName: string;
  byRole: string;
  at: Date;
  meaning: string | null;
  remark: string;
  hash: string;
}

const WORDS: Record<string, string> = {
  draft: 'Drafted',
  submit: 'Submitted',
  approve: 'Approved',
  return: 'Returned',
  withdraw: 'Withdrawn',
  issue: 'Issued',
  apply: 'Applied',
  verify: 'Verified',
  'roll-back': 'Rolled back',
};

/** Each step with who, when and what their signature means. */
export function EventList({ events }: { events: readonly EventRow[] }) {
  return (
    <ol className="m-0 list-none p-0">
      {events.map((event) => (
        <li key={event.seq} className="border-b border-hair py-2.5" data-event={event.action}>
          <div className="flex flex-wrap items-baseline justify-between gap-x-4">
            <span>
              <strong>{WORDS[event.action] ?? event.action}</strong> by {event.byName}, {event.byRole}
            </span>
            <span className="figure text-sm text-soft">{minute(event.at)}</span>
          </div>
          {event.meaning ? <p className="text-sm">“{event.meaning}”</p> : null}
          {event.remark ? <p className="text-sm whitespace-pre-line">Remark: {event.remark}</p> : null}
          <p className="font-mono text-xs break-all text-soft">
            {event.seq} · {event.hash.slice(0, 16)}
          </p>
        </li>
      ))}
    </ol>
  );
}
