'use client';

import { useId } from 'react';
import type { Tuning } from '@/lib/control/rules';
import { formatNumber, formatTimeS } from '@/lib/units';

function physical(dial: Tuning['dial'], value: number): string {
  if (dial.kind === 'closed-loop-time') return formatTimeS(value);
  const number = formatNumber(value, { significant: 3 });
  return dial.unit ? `${number} ${dial.unit}` : number;
}

/** The one dial: more is faster and less robust; it shows the physical value that it stands for. */
export function Dial({
  value,
  tuning,
  onChange,
}: {
  value: number;
  tuning: Tuning | null;
  onChange: (value: number) => void;
}) {
  const id = useId();
  const dial = tuning?.dial;
  const maximum = dial?.maximum ?? 1;
  const now = dial ? `${dial.symbol} = ${physical(dial, dial.value)}` : '';
  if (dial?.kind === 'none') return <p className="mt-3 text-sm text-soft">{dial.reason}</p>;
  return (
    <div className="mt-4">
      <div className="mb-1 flex justify-between text-sm">
        <label htmlFor={id} className="font-semibold">
          Aggressiveness
        </label>
        <output htmlFor={id} className="figure font-semibold" data-dial-value>
          {now}
        </output>
      </div>
      <input
        id={id}
        type="range"
        min={0}
        max={1}
        step={0.01}
        value={Math.min(value, maximum)}
        aria-valuetext={now}
        onChange={(event) => onChange(Math.min(Number(event.target.value), maximum))}
        className="h-6 w-full cursor-pointer accent-petrol"
      />
      <div className="flex justify-between text-xs text-soft">
        <span>calm{dial ? ` · ${physical(dial, dial.calm)}` : ''}</span>
        <span>{dial ? `${physical(dial, dial.sharp)} · ` : ''}sharp</span>
      </div>
      {dial?.reason ? <p className="mt-1 text-xs text-soft">{dial.reason}</p> : null}
    </div>
  );
}
