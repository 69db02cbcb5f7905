import type { DeviceRow } from '@/lib/control/forms';
import { formatNumber } from '@/lib/units';

export interface RecordRow {
  name: string;
  label: string;
  unit: string;
  from: number | null;
  fromText: string;
  to: number;
  toText: string;
  direction?: string;
  off?: string;
}

/** Pairs the rows of the version in service with those of the new one, by their parameter. */
export function recordRows(from: readonly DeviceRow[] | null, to: readonly DeviceRow[]): RecordRow[] {
  return to.map((row) => {
    const before = from?.find(({ name }) => name === row.name);
    return {
      name: row.name,
      label: row.label,
      unit: row.unit,
      from: before?.value ?? null,
      fromText: before ? (before.isOff ? `${before.text} (off)` : before.text) : '–',
      to: row.value,
      toText: row.isOff ? `${row.text} (off)` : row.text,
      direction: row.direction,
      off: row.off,
    };
  });
}

function ratio({ from, to }: RecordRow): string {
  if (from === null || from === 0 || !Number.isFinite(to / from)) return '–';
  return from === to ? 'same' : formatNumber(to / from, { significant: 3 });
}

/** What changes, from -> to, in the target's own unit. */
export function RecordSheet({
  rows,
  fromLabel,
  toLabel,
}: {
  rows: readonly RecordRow[];
  fromLabel: string;
  toLabel: string;
}) {
  return (
    <div className="overflow-x-auto">
      <table className="ledger text-sm">
        <caption className="sr-only">
          Gains from {fromLabel} to {toLabel}
        </caption>
        <thead>
          <tr>
            <th scope="col">Parameter</th>
            <th scope="col" className="right">
              {fromLabel}
            </th>
            <th scope="col" className="right">
              {toLabel}
            </th>
            <th scope="col">Unit</th>
            <th scope="col" className="right">
              <abbr title="new value divided by old value" className="no-underline">
                new ÷ old
              </abbr>
            </th>
          </tr>
        </thead>
        <tbody>
          {rows.map((row) => (
            <tr key={row.name} data-row={row.name}>
              <td>
                {row.label}
                {row.direction ? <span className="block text-xs text-soft">{row.direction}</span> : null}
              </td>
              <td className="right font-mono">{row.fromText}</td>
              <td className="right font-mono font-semibold">{row.toText}</td>
              <td>{row.unit || '–'}</td>
              <td className="figure right">{ratio(row)}</td>
            </tr>
          ))}
        </tbody>
      </table>
    </div>
  );
}
