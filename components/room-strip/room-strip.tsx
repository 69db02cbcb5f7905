import { formatNumber, formatTimeS } from '@/lib/units';
import { REQUIREMENT_ITEMS, type VerdictItem } from '@/lib/requirement';
import type { AxisUnits } from '@/lib/control/forms';
import { limitUnit } from '../worksheet/units';

/** The limit stands at this share of the track, so that what lies beyond it can still be drawn. */
const LIMIT_AT = 0.7;

function Bar({ item, upper }: { item: VerdictItem; upper: boolean }) {
  const { value, limit } = item;
  if (value === null) return null;
  const size = Math.abs(value);
  // For a least value the bar is drawn the same way round: right of the tick is the good side then.
  const share = limit === 0 ? (size === 0 ? 0 : 2) : size / Math.abs(limit);
  const end = Math.min(1, (Number.isFinite(share) ? share : 99) * LIMIT_AT);
  const beyond = upper && end > LIMIT_AT;
  const missing = !upper && !item.pass;
  return (
    <>
      <span
        className="absolute top-1 left-0 h-2 bg-petrol"
        style={{ width: `${100 * (beyond ? LIMIT_AT : end)}%` }}
      />
      {beyond || missing ? (
        <span
          className="hatched absolute top-1 h-2"
          style={{
            left: `${100 * (beyond ? LIMIT_AT : end)}%`,
            width: `${100 * (beyond ? end - LIMIT_AT : LIMIT_AT - end)}%`,
          }}
        />
      ) : null}
    </>
  );
}

/** "187 ms" or "16.8 %": a figure of the requirement with its unit. */
function figure(value: number, unit: string): string {
  if (unit === 's') return formatTimeS(value);
  const number = formatNumber(value, { significant: 3 });
  if (unit === '') return number;
  return unit === '°' ? `${number}°` : `${number} ${unit}`;
}

function verdictWords(item: VerdictItem, unit: string, upper: boolean): string {
  if (item.value === null) return 'not defined';
  if (item.room === null || !Number.isFinite(item.room)) return item.pass ? 'unlimited room' : 'not met';
  const room = figure(Math.abs(item.room), unit);
  if (item.pass) return `room ${room}`;
  return upper ? `over by ${room}` : `short by ${room}`;
}

/** One line per limit: the limit, the value, and the room left between them. */
export function RoomStrip({
  items,
  units,
  showCase,
}: {
  items: readonly VerdictItem[];
  units: AxisUnits;
  showCase: boolean;
}) {
  return (
    <ul className="m-0 list-none p-0" aria-label="Room to each limit">
      {items.map((item) => {
        const row = REQUIREMENT_ITEMS.find(({ key }) => key === item.requirement);
        if (!row) return null;
        const unit = limitUnit(row.unit, units);
        const upper = row.kind === 'max';
        return (
          <li
            key={item.requirement}
            data-requirement={item.requirement}
            className="grid grid-cols-[1fr_auto] items-center gap-x-3.5 gap-y-0.5 border-b border-hair py-2 sm:grid-cols-[minmax(150px,1.3fr)_104px_minmax(70px,1fr)_minmax(112px,auto)]"
          >
            <span>
              {row.label}{' '}
              <span className="figure text-sm whitespace-nowrap text-soft">
                {upper ? '≤' : '≥'} {figure(item.limit, unit)}
              </span>
              {showCase && item.loadCase ? (
                <span className="block text-xs text-soft">{item.loadCase}</span>
              ) : null}
            </span>
            <span className="figure text-right font-medium whitespace-nowrap">
              {item.value === null ? '–' : figure(item.value, unit)}
            </span>
            <span className="relative col-span-2 h-4 sm:col-span-1" aria-hidden="true">
              <span className="absolute inset-x-0 top-[7px] h-0.5 bg-hair" />
              <Bar item={item} upper={upper} />
              <span className="absolute -top-0.5 h-5 w-0.5 bg-ink" style={{ left: `${100 * LIMIT_AT}%` }} />
            </span>
            <span
              className={`col-span-2 text-sm font-semibold sm:col-span-1 ${item.pass ? 'text-moss' : 'text-brick'}`}
            >
              <span aria-hidden="true">{item.pass ? '✓ ' : '✕ '}</span>
              <span className="sr-only">{item.pass ? 'held, ' : 'not held, '}</span>
              {verdictWords(item, unit, upper)}
            </span>
          </li>
        );
      })}
    </ul>
  );
}
