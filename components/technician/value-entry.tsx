'use client';

import { useId } from 'react';
import type { ReadBack } from './read-back';
import type { SheetRow } from './types';

const LOOK: Record<ReadBack['kind'], { box: string; word: string }> = {
  empty: { box: '', word: '' },
  unreadable: { box: 'bg-brick-wash', word: 'text-brick' },
  same: { box: '', word: 'text-moss' },
  rounded: { box: '', word: 'text-moss' },
  different: { box: 'bg-ochre-wash', word: 'text-ochre' },
};

function words(answer: ReadBack, same: string): string {
  switch (answer.kind) {
    case 'empty':
      return '';
    case 'same':
      return `✓ ${same}`;
    case 'rounded':
      return `✓ ${answer.message}`;
    case 'unreadable':
      return `✕ ${answer.message}`;
    case 'different':
      return `! ${answer.message}`;
  }
}

/** One parameter in the device's order: what it should be, and a box sized for gloves for what the device shows. */
export function ValueEntry({
  row,
  shown,
  text,
  answer,
  same,
  label,
  onChange,
}: {
  row: SheetRow;
  /** The value printed large beside the box; null keeps it covered. */
  shown: string | null;
  text: string;
  answer: ReadBack;
  /** What a matching value is told as. */
  same: string;
  /** Which value is asked for: "as found", "as left". */
  label: string;
  onChange: (text: string) => void;
}) {
  const id = useId();
  const look = LOOK[answer.kind];
  const verdict = words(answer, same);
  return (
    <div className={`border-b border-hair p-4 last:border-b-0 ${look.box}`} data-value={row.name}>
      <div className="flex items-baseline justify-between gap-3">
        <label htmlFor={id} className="font-bold">
          {row.label}
          <span className="sr-only">, {label}</span>
        </label>
        <span className="text-sm">{row.off ? `${row.unit} · ${row.off}` : row.unit}</span>
      </div>
      <div className="mt-1 flex flex-wrap items-center justify-between gap-3">
        <span className="font-mono text-3xl font-semibold break-all">
          {shown ?? <span className="text-base font-normal">covered</span>}
        </span>
        <input
          id={id}
          inputMode="decimal"
          autoComplete="off"
          enterKeyHint="next"
          value={text}
          aria-describedby={`${id}-verdict`}
          aria-invalid={answer.kind === 'unreadable' || undefined}
          onChange={(event) => onChange(event.target.value)}
          className="min-h-16 w-40 rounded border-2 border-edge bg-sheet px-3 font-mono text-xl"
        />
      </div>
      <p className="mt-1 text-sm">{row.direction}</p>
      <p id={`${id}-verdict`} className={`min-h-5 text-sm font-bold ${look.word}`} aria-live="polite">
        {verdict}
      </p>
    </div>
  );
}
