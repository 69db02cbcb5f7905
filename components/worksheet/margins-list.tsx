import type { Margins } from '@/lib/control/types';
import { formatNumber, formatTimeS } from '@/lib/units';

interface Row {
  key: string;
  label: string;
  value: string;
  safer: string;
}

const NONE = 'not defined';
const number = (value: number | null) => (value === null ? NONE : formatNumber(value, { significant: 4 }));

function rows(margins: Margins): Row[] {
  const { gainMargin, gainMarginDb, gainMarginLow, phaseMarginDeg, delayMarginS, ms, mt } = margins;
  const decibels = Number.isFinite(gainMarginDb)
    ? ` (${formatNumber(gainMarginDb, { significant: 3 })} dB)`
    : '';
  return [
    {
      key: 'gain-margin',
      label: 'Gain margin',
      value: `${number(gainMargin)}${decibels}`,
      safer: 'larger is safer',
    },
    ...(gainMarginLow > 0
      ? [
          {
            key: 'gain-margin-low',
            label: 'Gain margin, downward',
            value: number(gainMarginLow),
            safer: 'smaller is safer',
          },
        ]
      : []),
    {
      key: 'phase-margin',
      label: 'Phase margin',
      value:
        phaseMarginDeg === null
          ? NONE
          : `${number(phaseMarginDeg)}${Number.isFinite(phaseMarginDeg) ? '°' : ''}`,
      safer: 'larger is safer',
    },
    {
      key: 'delay-margin',
      label: 'Delay margin',
      value: delayMarginS === null ? NONE : Number.isFinite(delayMarginS) ? formatTimeS(delayMarginS) : '∞',
      safer: 'larger is safer',
    },
    { key: 'ms', label: 'Sensitivity peak Ms', value: number(ms), safer: 'smaller is safer' },
    { key: 'mt', label: 'Complementary peak Mt', value: number(mt), safer: 'smaller is safer' },
  ];
}

/** The margins in figures, each with the side on which it is safer. */
export function MarginsList({ margins }: { margins: Margins }) {
  return (
    <dl className="mt-4 grid grid-cols-1 gap-x-6 text-sm sm:grid-cols-2">
      {rows(margins).map(({ key, label, value, safer }) => (
        <div
          key={key}
          data-margin={key}
          className="flex flex-wrap items-baseline justify-between gap-x-3 border-b border-hair py-1.5"
        >
          <dt>
            {label} <span className="text-xs text-soft">{safer}</span>
          </dt>
          <dd className="figure m-0 font-medium">{value}</dd>
        </div>
      ))}
    </dl>
  );
}
