'use client';

import { useRouter } from 'next/navigation';
import { useState } from 'react';
import { formatNumber, parseNumber } from '@/lib/units';
import { callApi, type Problem } from '../forms/api-client';
import { ProblemNotice } from '../forms/problem-notice';
import { Button } from '../ui/button';
import { TextArea } from '../ui/field';
import { readBack } from './read-back';
import type { SheetData } from './types';
import { ValueEntry } from './value-entry';

/** Puts the old values back, reads each one back from the device, and records why. */
export function RollBack({
  sheet,
  found,
}: {
  sheet: SheetData;
  found: Readonly<Record<string, number>> | null;
}) {
  const router = useRouter();
  const [texts, setTexts] = useState<Record<string, string>>({});
  const [reason, setReason] = useState('');
  const [problem, setProblem] = useState<Problem | null>(null);
  const [busy, setBusy] = useState(false);
  const old = (name: string, from: number | null) => found?.[name] ?? from;
  const entries = sheet.rows.map((row) => {
    const expected = old(row.name, row.from);
    return { row, expected, answer: readBack(texts[row.name] ?? '', expected, row, {}) };
  });
  const ready =
    entries.every(({ answer }) => answer.kind !== 'empty' && answer.kind !== 'unreadable') &&
    reason.trim() !== '';

  async function send() {
    setBusy(true);
    setProblem(null);
    const asLeft = Object.fromEntries(
      sheet.rows.map((row) => {
        const parsed = parseNumber(texts[row.name] ?? '', { unit: row.unit });
        return [row.name, parsed.ok ? parsed.value : Number.NaN];
      }),
    );
    const answer = await callApi('POST', `/changes/${sheet.changeId}/roll-back`, { reason, asLeft });
    setBusy(false);
    if (!answer.ok) return setProblem(answer.problem);
    router.push(`/changes/${sheet.changeId}`);
    router.refresh();
  }

  return (
    <div className="mx-auto max-w-[520px] px-4 pb-8">
      <h2 className="mt-4 text-lg text-brick">Roll back to the old values</h2>
      <p className="mt-1 mb-3">{sheet.wayBack || 'Enter the old values and save them in the device.'}</p>
      <div className="rounded-lg border-2 border-brick bg-sheet">
        {entries.map(({ row, expected, answer }) => (
          <ValueEntry
            key={row.name}
            row={row}
            label="rolled back"
            shown={expected === null ? 'not known' : formatNumber(expected, { significant: 7 })}
            text={texts[row.name] ?? ''}
            answer={answer}
            same="back as it was"
            onChange={(text) => setTexts({ ...texts, [row.name]: text })}
          />
        ))}
      </div>
      <div className="mt-4 grid gap-3">
        <TextArea
          label="What went wrong"
          rows={3}
          required
          value={reason}
          onChange={(event) => setReason(event.target.value)}
        />
        {problem ? <ProblemNotice problem={problem} /> : null}
        <Button size="glove" weight="danger" disabled={busy || !ready} onClick={() => void send()}>
          {busy ? 'Sending …' : 'Record the roll-back'}
        </Button>
      </div>
    </div>
  );
}
