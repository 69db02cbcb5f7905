'use client';

import { CurveChart } from '../charts/curve-chart';
import type { Curve } from '../charts/types';
import { timeScale } from '../charts/time-scale';
import type { AxisUnits } from '@/lib/control/forms';
import type { LoopCheck } from '@/lib/sim/types';
import { formatNumber, formatTimeS } from '@/lib/units';

type Times = ArrayLike<number>;

function scaled(t: Times, seconds: number): Float64Array {
  return Float64Array.from(t, (value) => value / seconds);
}

interface Pair {
  label: string;
  beforeLabel: string;
  check: LoopCheck;
  before: LoopCheck | null;
}

type Trace = { t: Times; values: Times } | null;

/** The proposal as a solid petrol line, what is in service behind it as a dashed plum line. */
function traces(pair: Pair, pick: (check: LoopCheck) => Trace, seconds: number): Curve[] {
  const now = pick(pair.check);
  const before = pair.before ? pick(pair.before) : null;
  const curves: Curve[] = [];
  if (now) curves.push({ label: pair.label, x: scaled(now.t, seconds), y: now.values, tone: 'petrol' });
  if (before)
    curves.push({
      label: pair.beforeLabel,
      x: scaled(before.t, seconds),
      y: before.values,
      tone: 'plum',
      dash: [6, 4],
    });
  return curves;
}

/** Set-point response, load response and control signal of the shown load case. */
export function ResponsePlots({ pair, units }: { pair: Pair; units: AxisUnits }) {
  const { setpoint, load } = pair.check;
  if (!setpoint || !load) return null;
  const time = timeScale(setpoint.horizonS);
  const loadTime = timeScale(load.horizonS);
  const gain = `${units.input} per ${units.output}`;
  const step = `${units.input} per ${units.input}`;
  const peakMark =
    setpoint.peakTimeS !== null && setpoint.overshootPct >= 0.05
      ? [
          {
            x: setpoint.peakTimeS / time.seconds,
            y: setpoint.final + (Math.abs(setpoint.final) * setpoint.overshootPct) / 100,
            text: `+${formatNumber(setpoint.overshootPct, { significant: 3 })} %`,
          },
        ]
      : [];
  const loadMark =
    load.peakTimeS !== null
      ? [
          {
            x: load.peakTimeS / loadTime.seconds,
            y: load.peak,
            text: formatNumber(load.peak, { significant: 3 }),
          },
        ]
      : [];
  return (
    <>
      <CurveChart
        title="Set-point step"
        unit={step}
        xUnit={time.unit}
        curves={traces(pair, ({ setpoint: r }) => r && { t: r.t, values: r.y }, time.seconds)}
        marks={peakMark}
        levels={[setpoint.final]}
        description={`Response to a unit set-point step: overshoot ${formatNumber(setpoint.overshootPct, { significant: 3 })} %, settles within 2 % after ${setpoint.settlingTimeS === null ? 'no time in view' : formatTimeS(setpoint.settlingTimeS)}.`}
      />
      <CurveChart
        title="Load step at the input"
        unit={gain}
        xUnit={loadTime.unit}
        curves={traces(pair, ({ load: r }) => r && { t: r.t, values: r.y }, loadTime.seconds)}
        marks={loadMark}
        levels={[0]}
        description={`Response to a unit load step: peak ${formatNumber(load.peak, { significant: 3 })}, recovers after ${load.recoveryTimeS === null ? 'no time in view' : formatTimeS(load.recoveryTimeS)}.`}
      />
      <CurveChart
        title="Control signal, set-point step"
        unit={`${units.output} per ${units.input}`}
        xUnit={time.unit}
        curves={traces(pair, ({ setpoint: r }) => r && { t: r.t, values: r.u }, time.seconds)}
        description={`Controller output after a unit set-point step: peak ${formatNumber(setpoint.controlPeak, { significant: 3 })}.`}
      />
    </>
  );
}
