'use client';

import { useRouter } from 'next/navigation';
import { useState } from 'react';
import { parseNumber } from '@/lib/units';
import { callApi, type Problem } from '../forms/api-client';
import { ProblemNotice } from '../forms/problem-notice';
import { Button } from '../ui/button';
import {
  BeforeStep,
  CloseStep,
  EnterStep,
  FoundStep,
  foundAnswers,
  leftAnswers,
  WayBackPanel,
} from './steps';
import { STEPS, type SheetData, type SheetDraft, type Step } from './types';
import { useDraft } from './use-draft';

const VIEWS = { before: BeforeStep, found: FoundStep, enter: EnterStep, close: CloseStep };
const NEXT_WORDS: Record<Step, string> = {
  before: 'Next: as found',
  found: 'Uncover the new values',
  enter: 'Next: save and close',
  close: 'Mark as applied',
};

/** What still has to be answered on this step; null when it is complete. */
function missing(step: Step, sheet: SheetData, draft: SheetDraft): string | null {
  if (step === 'before') {
    if (draft.deviceLabel.trim() === '') return 'Type the device label first.';
    if (draft.acknowledged.length < sheet.cautions.length) return 'Tick every caution first.';
    return null;
  }
  if (step === 'found') {
    const kinds = foundAnswers(sheet, draft).map(({ kind }) => kind);
    if (kinds.includes('empty') || kinds.includes('unreadable'))
      return 'Type every value that the device shows.';
    if (kinds.includes('different') && draft.asFoundRemark.trim() === '')
      return 'Something else was found: write down who was asked and what was said.';
    return null;
  }
  if (step === 'enter') {
    const kinds = leftAnswers(sheet, draft).map(({ kind }) => kind);
    if (kinds.includes('empty') || kinds.includes('unreadable'))
      return 'Type every value as the device shows it now.';
    return kinds.includes('different')
      ? 'A value differs from the sheet: correct it, or go back to the old values.'
      : null;
  }
  return draft.saved === '' ? 'Say whether the values are saved in the device.' : null;
}

function numbers(texts: Readonly<Record<string, string>>, sheet: SheetData): Record<string, number> {
  return Object.fromEntries(
    sheet.rows.flatMap((row) => {
      const parsed = parseNumber(texts[row.name] ?? '', { unit: row.unit });
      return parsed.ok ? [[row.name, parsed.value]] : [];
    }),
  );
}

function applyBody(sheet: SheetData, draft: SheetDraft) {
  const { slot, firmware, asFoundRemark, remark } = draft;
  return {
    cautionsAcknowledged: true,
    identity: {
      deviceLabel: draft.deviceLabel.trim(),
      ...(slot.trim() ? { slot: slot.trim() } : {}),
      ...(firmware.trim() ? { firmware: firmware.trim() } : {}),
    },
    asFound: numbers(draft.asFound, sheet),
    asLeft: numbers(draft.asLeft, sheet),
    saved: draft.saved,
    ...(asFoundRemark.trim() ? { asFoundRemark: asFoundRemark.trim() } : {}),
    ...(remark.trim() ? { remark: remark.trim() } : {}),
  };
}

/** One question on a screen, the way back always in reach. */
export function TechnicianSheet({ sheet }: { sheet: SheetData }) {
  const router = useRouter();
  const [draft, write, clear] = useDraft(sheet.changeId);
  const [back, setBack] = useState(false);
  const [problem, setProblem] = useState<Problem | null>(null);
  const [busy, setBusy] = useState(false);
  const [asked, setAsked] = useState<Step | null>(null);
  const index = STEPS.indexOf(draft.step);
  const View = VIEWS[draft.step];
  const gap = missing(draft.step, sheet, draft);

  async function next() {
    if (gap) return setAsked(draft.step);
    setAsked(null);
    if (draft.step !== 'close') {
      write({ step: STEPS[index + 1] });
      window.scrollTo({ top: 0 });
      return;
    }
    setBusy(true);
    setProblem(null);
    // The change can be applied once only, so its own id is the key: sending again never applies twice.
    const answer = await callApi(
      'POST',
      `/changes/${sheet.changeId}/apply`,
      applyBody(sheet, draft),
      `apply-${sheet.changeId}`,
    );
    setBusy(false);
    if (!answer.ok) return setProblem(answer.problem);
    clear();
    router.push(`/changes/${sheet.changeId}`);
    router.refresh();
  }

  return (
    <div className="mx-auto max-w-[520px] px-4 pb-8">
      <div className="flex gap-2 py-2" aria-label={`Step ${index + 1} of ${STEPS.length}`} role="img">
        {STEPS.map((step, position) => (
          <span key={step} className={`h-1.5 grow ${position <= index ? 'bg-petrol' : 'bg-rule'}`} />
        ))}
      </div>
      {back ? (
        <WayBackPanel sheet={sheet} draft={draft} onClose={() => setBack(false)} />
      ) : (
        <View sheet={sheet} draft={draft} write={write} />
      )}
      <div className="mt-4 grid gap-2.5">
        <div className="border-l-[5px] border-brick bg-brick-wash px-3.5 py-2.5">
          <strong>Stop and go back</strong> if it swings and grows, moves the wrong way, or sounds, smells or
          heats wrong.
        </div>
        {asked === draft.step && gap ? (
          <p role="alert" className="font-bold text-brick">
            ✕ {gap}
          </p>
        ) : null}
        {problem ? <ProblemNotice problem={problem} /> : null}
        {!back && (draft.step === 'enter' || draft.step === 'close') ? (
          <Button size="glove" weight="danger" onClick={() => setBack(true)}>
            Went wrong: show the old values
          </Button>
        ) : null}
        {!back ? (
          <Button size="glove" weight="primary" disabled={busy} onClick={() => void next()}>
            {busy ? 'Sending …' : NEXT_WORDS[draft.step]}
          </Button>
        ) : null}
        {index > 0 && !back ? (
          <Button size="glove" weight="plain" onClick={() => write({ step: STEPS[index - 1] })}>
            One step back
          </Button>
        ) : null}
        <p className="text-sm">What you type stays on this device until it is sent.</p>
      </div>
    </div>
  );
}
