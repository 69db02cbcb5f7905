import Link from 'next/link';
import { recordRows, RecordSheet } from '../record-sheet/record-sheet';
import { WorksheetSection } from '../ui/section';
import type { WorksheetAxis } from './types';

/** What would change on the machine, and what is already under way. */
export function HandOverSection({ axis }: { axis: WorksheetAxis }) {
  const { lastKept, inService, openChanges } = axis;
  const pending = lastKept && lastKept.version !== inService?.version ? lastKept : null;
  return (
    <WorksheetSection number={5} title="Hand over" note="change record" last>
      {pending ? (
        <RecordSheet
          rows={recordRows(inService?.rows ?? null, pending.rows)}
          fromLabel={inService ? `v${inService.version} in service` : 'none in service'}
          toLabel={`v${pending.version} kept`}
        />
      ) : (
        <p className="text-sm text-soft">
          {lastKept
            ? `The last kept version, v${lastKept.version}, is the one in service. Keep another to hand it over.`
            : 'Nothing is kept yet. Keep these gains as a version first.'}
        </p>
      )}
      {openChanges.length > 0 ? (
        <ul className="mt-3 list-none p-0 text-sm">
          {openChanges.map(({ id, number, state, toVersion }) => (
            <li key={id}>
              <Link className="link" href={`/changes/${id}`}>
                {number}
              </Link>{' '}
              to v{toVersion}: {state}
            </li>
          ))}
        </ul>
      ) : null}
      {axis.lastVersion > 0 ? (
        <p className="mt-3 text-sm">
          <Link className="link" href={`/axes/${axis.id}/versions`}>
            All {axis.lastVersion} {axis.lastVersion === 1 ? 'version' : 'versions'} and what differs between
            them
          </Link>
        </p>
      ) : null}
    </WorksheetSection>
  );
}
