import type { ReactNode } from 'react';
import type { DeviceRow } from '@/lib/control/forms';

/** Gains as the target device wants them: never a bare number. */
export function GainCard({
  rows,
  form,
  warnings = [],
  children,
}: {
  rows: readonly DeviceRow[];
  /** "parallel · seconds": how the device reads these numbers. */
  form: string;
  warnings?: readonly string[];
  children?: ReactNode;
}) {
  return (
    <div className="mt-3.5 rounded-lg border-[1.5px] border-ink bg-sheet" data-gain-card>
      <div className="flex flex-wrap items-baseline justify-between gap-x-3 border-b border-rule px-3.5 py-2 text-sm">
        <strong>Gain card</strong>
        <span className="text-soft">as the device wants it: {form}</span>
      </div>
      {rows.map((row) => (
        <div
          key={row.name}
          data-gain={row.name}
          className="grid grid-cols-[minmax(112px,auto)_1fr] items-baseline gap-x-3 border-b border-hair px-3.5 py-2 last:border-b-0 sm:grid-cols-[minmax(112px,auto)_auto_1fr]"
        >
          <span>{row.label}</span>
          <span className="font-mono text-xl font-semibold">{row.text}</span>
          <span className="col-span-2 text-sm text-soft sm:col-span-1 sm:text-right">
            {row.isOff && row.off ? row.off : `${row.unit ? `${row.unit} · ` : ''}${row.direction}`}
          </span>
          {row.roundsToOff ? (
            <span className="col-span-full text-sm font-semibold text-brick">
              ✕ Rounds to off in this device.
            </span>
          ) : null}
          {row.outsideLimits ? (
            <span className="col-span-full text-sm font-semibold text-brick">
              ✕ Outside what this device accepts.
            </span>
          ) : null}
        </div>
      ))}
      {warnings.map((warning) => (
        <p key={warning} className="border-t border-hair px-3.5 py-2 text-sm text-ochre">
          ! {warning}
        </p>
      ))}
      {children}
    </div>
  );
}
