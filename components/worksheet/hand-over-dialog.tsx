'use client';

import { useRouter } from 'next/navigation';
import { useState } from 'react';
import { callApi, type Problem } from '../forms/api-client';
import { ProblemNotice } from '../forms/problem-notice';
import { recordRows, RecordSheet } from '../record-sheet/record-sheet';
import { Button } from '../ui/button';
import { Dialog } from '../ui/dialog';
import { TextArea, TextField } from '../ui/field';
import { Segmented } from '../ui/segmented';
import type { KeptVersion, WorksheetAxis } from './types';

type SafetyAnswer = 'no' | 'yes' | 'unknown';

const SAFETY: readonly { value: SafetyAnswer; label: string }[] = [
  { value: 'no', label: 'no' },
  { value: 'yes', label: 'yes' },
  { value: 'unknown', label: 'don’t know' },
];

const EMPTY = { reason: '', risk: '', test: '', wayBack: '', siteReference: '' };

function defaultWayBack(axis: WorksheetAxis): string {
  return axis.inService
    ? `Enter the values of v${axis.inService.version} again, as found, and save them in the device.`
    : 'Enter the as-found values again and save them in the device.';
}

/** Drafts the change from the version in service to a kept one and submits it for signature. */
export function HandOverDialog({
  open,
  onOpenChange,
  axis,
  to,
}: {
  open: boolean;
  onOpenChange: (open: boolean) => void;
  axis: WorksheetAxis;
  to: KeptVersion;
}) {
  const router = useRouter();
  const [text, setText] = useState({ ...EMPTY, wayBack: defaultWayBack(axis) });
  const [safety, setSafety] = useState<SafetyAnswer | ''>('');
  const [problem, setProblem] = useState<Problem | null>(null);
  const [busy, setBusy] = useState(false);
  const [draftId, setDraftId] = useState<string | null>(null);
  const set = (field: keyof typeof EMPTY) => (event: { target: { value: string } }) =>
    setText({ ...text, [field]: event.target.value });
  const needsReference = safety === 'yes' || safety === 'unknown';
  const ready = text.reason.trim() !== '' && safety !== '';

  async function send() {
    setBusy(true);
    setProblem(null);
    const filled = Object.fromEntries(Object.entries(text).filter(([, value]) => value.trim() !== ''));
    const draft = draftId
      ? ({ ok: true, value: { id: draftId } } as const)
      : await callApi<{ id: string }>('POST', '/changes', {
          axisId: axis.id,
          gainSetId: to.id,
          safetyFunction: safety,
          ...filled,
        });
    if (draft.ok) {
      setDraftId(draft.value.id);
      const submitted = await callApi('POST', `/changes/${draft.value.id}/submit`, {});
      if (submitted.ok) {
        router.push(`/changes/${draft.value.id}`);
        return;
      }
      setProblem(submitted.problem);
    } else setProblem(draft.problem);
    setBusy(false);
  }

  const fromLabel = axis.inService ? `v${axis.inService.version}` : 'none';
  return (
    <Dialog
      open={open}
      onOpenChange={onOpenChange}
      title={`Hand over v${to.version} of ${axis.tag}`}
      description="Drafts the change record and submits it to the approver. Nothing reaches the machine before it is signed and issued."
    >
      <RecordSheet
        rows={recordRows(axis.inService?.rows ?? null, to.rows)}
        fromLabel={fromLabel}
        toLabel={`v${to.version}`}
      />
      <form
        className="mt-4 grid gap-4"
        onSubmit={(event) => {
          event.preventDefault();
          void send();
        }}
      >
        <TextArea
          label="Reason"
          hint="Why the gains change."
          rows={2}
          required
          value={text.reason}
          onChange={set('reason')}
        />
        <TextArea
          label="Risk"
          hint="What could go wrong, and for whom."
          rows={2}
          value={text.risk}
          onChange={set('risk')}
        />
        <TextArea
          label="Test to run"
          hint="The move to make, what to record, and the limits at which to stop."
          rows={2}
          value={text.test}
          onChange={set('test')}
        />
        <TextArea label="Way back" rows={2} value={text.wayBack} onChange={set('wayBack')} />
        <div>
          <p className="mb-1 text-sm font-semibold">Is this loop part of a safety function?</p>
          <Segmented
            name="safety-function"
            label="Is this loop, its sensor, its final element or its limits part of a safety function?"
            choices={SAFETY}
            value={safety as SafetyAnswer}
            onChange={setSafety}
          />
          <p className="mt-1 text-xs text-soft">
            The loop itself, its sensor, its final element or its limits.
          </p>
        </div>
        {needsReference ? (
          <TextField
            label="Site's own reference"
            hint="The site's procedure comes first. Without its number the change can't be issued."
            value={text.siteReference}
            onChange={set('siteReference')}
          />
        ) : null}
        {problem ? <ProblemNotice problem={problem} /> : null}
        <div className="flex flex-wrap justify-end gap-3">
          <Button onClick={() => onOpenChange(false)}>Not yet</Button>
          <Button weight="primary" type="submit" disabled={busy || !ready}>
            {busy ? 'Submitting …' : 'Submit for signature'}
          </Button>
        </div>
      </form>
    </Dialog>
  );
}
