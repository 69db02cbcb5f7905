'use client';

import dynamic from 'next/dynamic';
import type { AxisUnits } from '@/lib/control/forms';
import type { LoadCaseVerdict } from '@/lib/requirement';
import { RoomStrip } from '../room-strip/room-strip';
import { Notice } from '../ui/notice';
import { WorksheetSection } from '../ui/section';
import { MarginsList } from './margins-list';
import type { Preview } from './preview';

// The plots come in after the page: chart.js is the heaviest thing on it.
const ResponsePlots = dynamic(() => import('./response-plots').then((module) => module.ResponsePlots), {
  ssr: false,
});
const BodePlots = dynamic(() => import('./bode-plots').then((module) => module.BodePlots), { ssr: false });

/** What the verdict says, first of all whether the loop is stable. */
export function VerdictNotice({ preview }: { preview: Preview | null }) {
  const unstable = preview?.cases.find(({ check }) => check && !check.stable);
  if (!preview) return <Notice tone="plain" title="Working out the check …" live />;
  if (!preview.verdict && !unstable)
    return (
      <Notice tone="plain" title="Nothing to check yet">
        A plant and gains are needed first.
      </Notice>
    );
  if (unstable)
    return (
      <Notice tone="bad" title="Unstable loop" live>
        {preview.cases.length > 1 ? `With load case “${unstable.name}” the` : 'The'} closed loop does not come
        to rest with these gains: no margin and no settling time can be stated. Lower the gain or check its
        sign.
      </Notice>
    );
  const verdict = preview.verdict?.verdict;
  if (!verdict || verdict.pass === null)
    return (
      <Notice tone="plain" title="Stable loop" live>
        No limit is stated, so nothing is judged.
      </Notice>
    );
  return (
    <Notice
      tone={verdict.pass ? 'good' : 'bad'}
      title={verdict.pass ? 'Requirement met' : 'Requirement not met'}
      live
    >
      {verdict.sentence}
    </Notice>
  );
}

/** The verdict in one line, for the foot of a small screen. */
export function VerdictLine({ preview }: { preview: Preview | null }) {
  const unstable = preview?.cases.some(({ check }) => check && !check.stable) ?? false;
  const verdict = preview?.verdict?.verdict;
  if (!preview) return <Notice tone="plain" title="Working out the check …" />;
  if (unstable) return <Notice tone="bad" title="Unstable loop" />;
  if (!verdict || verdict.pass === null)
    return <Notice tone="plain" title={verdict ? 'Stable, no limit stated' : 'Nothing to check yet'} />;
  const held = verdict.items.filter(({ pass }) => pass).length;
  return (
    <Notice
      tone={verdict.pass ? 'good' : 'bad'}
      title={verdict.pass ? 'Requirement met' : 'Requirement not met'}
    >
      {held} of {verdict.items.length} limits held
    </Notice>
  );
}

function checkNote(preview: Preview | null, verdict: LoadCaseVerdict | null | undefined): string {
  if (!preview || preview.cases.length < 2 || !verdict) return 'linear model, exact dead time';
  return `worst of ${preview.cases.length} load cases: ${verdict.worst.name}`;
}

export function CheckSection({
  preview,
  shown,
  units,
  newLabel,
  beforeLabel,
}: {
  preview: Preview | null;
  shown: number;
  units: AxisUnits;
  newLabel: string;
  beforeLabel: string;
}) {
  const verdict = preview?.verdict;
  const current = preview?.cases[shown];
  const check = current?.check;
  const several = (preview?.cases.length ?? 0) > 1;
  return (
    <WorksheetSection number={4} title="Check" note={checkNote(preview, verdict)} last>
      <VerdictNotice preview={preview} />
      {verdict ? (
        <div className="mt-3">
          <RoomStrip items={verdict.verdict.items} units={units} showCase={several} />
        </div>
      ) : null}
      {check?.stable ? (
        <>
          {several ? <h3 className="mt-5 text-base">Load case: {current?.name}</h3> : null}
          <MarginsList margins={check.margins} />
          {check.warnings.map((warning) => (
            <p key={warning} className="mt-2 text-sm text-ochre">
              ! {warning}
            </p>
          ))}
        </>
      ) : null}
      <div className="mt-5 grid grid-cols-1 gap-x-6 gap-y-5 md:grid-cols-2">
        {check?.stable ? (
          <ResponsePlots
            pair={{ label: newLabel, beforeLabel, check, before: preview?.before ?? null }}
            units={units}
          />
        ) : null}
        {check && preview?.bode ? <BodePlots bode={preview.bode} margins={check.margins} /> : null}
      </div>
    </WorksheetSection>
  );
}
