import type { AxisUnits } from '@/lib/control/forms';
import type { Verdict } from '@/lib/requirement';
import { formatNumber } from '@/lib/units';
import { RoomStrip } from '../room-strip/room-strip';
import { Notice } from '../ui/notice';

interface Judged {
  version: number;
  verdict: Verdict;
  worstCase: string;
  checks: readonly { name: string; engines: { agreement: number } | null }[];
}

function Side({ judged, units, title }: { judged: Judged; units: AxisUnits; title: string }) {
  const { verdict, checks, worstCase } = judged;
  const agreement = Math.max(0, ...checks.map(({ engines }) => engines?.agreement ?? 0));
  return (
    <div className="min-w-0">
      <h3 className="mb-1 text-base">{title}</h3>
      <Notice
        tone={verdict.pass === null ? 'plain' : verdict.pass ? 'good' : 'bad'}
        title={
          verdict.pass === null ? 'No limit stated' : verdict.pass ? 'Requirement met' : 'Requirement not met'
        }
      >
        {verdict.sentence}
      </Notice>
      <RoomStrip items={verdict.items} units={units} showCase={checks.length > 1} />
      <p className="mt-1 text-xs text-soft">
        {checks.length > 1 ? `Worst of ${checks.length} load cases: ${worstCase}. ` : ''}
        {agreement > 0
          ? `Two engines agree to ${formatNumber(agreement, { significant: 1 })} of the response.`
          : ''}{' '}
        Computed with a linear model.
      </p>
    </div>
  );
}

/** The verdict of what runs now beside that of what is to come. */
export function VerdictPair({
  before,
  after,
  units,
}: {
  before: Judged | null;
  after: Judged;
  units: AxisUnits;
}) {
  return (
    <div className="grid gap-6">
      <Side judged={after} units={units} title={`v${after.version}, new`} />
      {before ? <Side judged={before} units={units} title={`v${before.version}, in service before`} /> : null}
    </div>
  );
}
