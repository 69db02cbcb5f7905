'use client';

import { useState } from 'react';
import { callApi, toApiNumber, type Problem } from '../forms/api-client';
import { ProblemNotice } from '../forms/problem-notice';
import { Button } from '../ui/button';
import { Dialog } from '../ui/dialog';
import { TextArea } from '../ui/field';
import type { Preview } from './preview';
import type { ReadFields, WorksheetState } from './state';
import type { WorksheetAxis } from './types';

export interface Kept {
  id: string;
  version: number;
}

/** The request that keeps what the worksheet shows; the server computes the check again by itself. */
function keepBody(preview: Preview, state: WorksheetState, fields: ReadFields, reason: string) {
  const controller = preview.controller;
  if (!controller) return null;
  const { kp, ti, td, n, b, c, filter } = controller;
  const tuning = preview.tuning?.ok ? preview.tuning.value : null;
  const { aggressiveness, type, variant } = state;
  return {
    loadCases: state.cases.map(({ name, text }) => ({ name: name.trim(), plant: { text } })),
    controller: {
      kp,
      ti: toApiNumber(ti),
      td,
      n,
      b,
      c,
      ...(filter ? { tf: filter.timeConstantS, filterOrder: filter.order } : {}),
    },
    ...(tuning
      ? { rule: tuning.rule, settings: { type, aggressiveness, ...(variant ? { variant } : {}) } }
      : {}),
    requirement: fields.requirement,
    reason: reason.trim(),
  };
}

/** Asks for the reason and keeps the gains as the next version of the axis. */
export function KeepDialog({
  open,
  onOpenChange,
  axis,
  preview,
  state,
  fields,
  onKept,
}: {
  open: boolean;
  onOpenChange: (open: boolean) => void;
  axis: WorksheetAxis;
  preview: Preview | null;
  state: WorksheetState;
  fields: ReadFields;
  onKept: (kept: Kept) => void;
}) {
  const [reason, setReason] = useState('');
  const [problem, setProblem] = useState<Problem | null>(null);
  const [busy, setBusy] = useState(false);
  const missing = problem === null && reason !== '' && reason.trim() === '';

  async function keep() {
    const body = preview ? keepBody(preview, state, fields, reason) : null;
    if (!body) return;
    setBusy(true);
    setProblem(null);
    const answer = await callApi<Kept>('POST', `/axes/${axis.id}/gain-sets`, body);
    setBusy(false);
    if (!answer.ok) return setProblem(answer.problem);
    setReason('');
    onOpenChange(false);
    onKept(answer.value);
  }

  return (
    <Dialog
      open={open}
      onOpenChange={onOpenChange}
      title={`Keep as v${axis.lastVersion + 1} of ${axis.tag}`}
      description="The server computes the check again with both engines. A kept version is never changed afterwards."
    >
      <form
        className="grid gap-4"
        onSubmit={(event) => {
          event.preventDefault();
          void keep();
        }}
      >
        <TextArea
          label="Reason"
          hint="What was wrong, and what these gains are meant to do."
          error={missing ? 'Say why in a few words.' : undefined}
          rows={3}
          required
          maxLength={2000}
          value={reason}
          onChange={(event) => setReason(event.target.value)}
        />
        {problem ? <ProblemNotice problem={problem} /> : null}
        <div className="flex flex-wrap justify-end gap-3">
          <Button onClick={() => onOpenChange(false)}>Not yet</Button>
          <Button weight="primary" type="submit" disabled={busy || reason.trim() === ''}>
            {busy ? 'Keeping …' : 'Keep this version'}
          </Button>
        </div>
      </form>
    </Dialog>
  );
}
