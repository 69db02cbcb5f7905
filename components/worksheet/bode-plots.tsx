'use client';

import { CurveChart } from '../charts/curve-chart';
import type { ChartMark } from '../charts/marks-plugin';
import type { BodeCurve } from '@/lib/control/frequency';
import type { Margins } from '@/lib/control/types';
import { formatNumber } from '@/lib/units';

const finite = (value: number | null): value is number =>
  value !== null && Number.isFinite(value) && value > 0;

/** Value of the curve at a frequency, on the logarithmic scale of the plot. */
function at(x: ArrayLike<number>, y: ArrayLike<number>, w: number): number {
  let i = 1;
  while (i < x.length - 1 && x[i] < w) i += 1;
  const share = Math.log(w / x[i - 1]) / Math.log(x[i] / x[i - 1]);
  return y[i - 1] + share * (y[i] - y[i - 1]);
}

/** Gain and phase of the open loop, with the points at which its margins are read. */
export function BodePlots({ bode, margins }: { bode: BodeCurve; margins: Margins }) {
  const decibels = Float64Array.from(bode.magnitude, (m) => 20 * Math.log10(m));
  const gainMarks: ChartMark[] = [];
  const phaseMarks: ChartMark[] = [];
  if (finite(margins.gainCrossover) && margins.phaseMarginDeg !== null) {
    const text = `PM ${formatNumber(margins.phaseMarginDeg, { significant: 3 })}°`;
    gainMarks.push({ x: margins.gainCrossover, y: 0, text });
    phaseMarks.push({
      x: margins.gainCrossover,
      y: at(bode.omega, bode.phaseDeg, margins.gainCrossover),
      text,
    });
  }
  if (finite(margins.phaseCrossover) && Number.isFinite(margins.gainMargin)) {
    const text = `GM ${formatNumber(margins.gainMargin, { significant: 3 })}`;
    gainMarks.push({ x: margins.phaseCrossover, y: -margins.gainMarginDb, text });
    phaseMarks.push({
      x: margins.phaseCrossover,
      y: at(bode.omega, bode.phaseDeg, margins.phaseCrossover),
      text,
    });
  }
  const words = `phase margin ${margins.phaseMarginDeg === null ? 'not defined' : formatNumber(margins.phaseMarginDeg, { significant: 3 })}°, gain margin ${formatNumber(margins.gainMargin, { significant: 3 })}`;
  return (
    <>
      <CurveChart
        title="Open loop: gain"
        unit="dB"
        xUnit="rad/s"
        logX
        curves={[{ label: 'gain', x: bode.omega, y: decibels, tone: 'petrol' }]}
        marks={gainMarks}
        levels={[0]}
        description={`Gain of the open loop over frequency; ${words}.`}
      />
      <CurveChart
        title="Open loop: phase"
        unit="degrees"
        xUnit="rad/s"
        logX
        curves={[{ label: 'phase', x: bode.omega, y: bode.phaseDeg, tone: 'ochre', dash: [9, 3] }]}
        marks={phaseMarks}
        levels={[-180]}
        yRange={phaseRange(bode.phaseDeg)}
        description={`Phase of the open loop over frequency; ${words}.`}
      />
    </>
  );
}

/** Dead time turns the phase without end: the plot keeps to what lies near the crossovers. */
function phaseRange(phaseDeg: ArrayLike<number>): { min: number; max: number; step: number } {
  let low = Infinity;
  let high = -Infinity;
  for (let i = 0; i < phaseDeg.length; i += 1) {
    low = Math.min(low, phaseDeg[i]);
    high = Math.max(high, phaseDeg[i]);
  }
  const max = Math.ceil((high + 1) / 45) * 45;
  const min = Math.max(Math.floor(low / 45) * 45, Math.min(max - 360, -360));
  return { min, max, step: max - min > 270 ? 90 : 45 };
}
