import type { ScaledLoop } from '../frequency/scaled-loop';

interface Crossing {
  readonly w: number;
  readonly phase: number;
}

/** Least lag (rad, in (0, 2π]) that brings a gain crossover to -1, and that crossover; null without crossover. */
export function phaseMargin(crossings: readonly Crossing[]): { lag: number; w: number } | null {
  let least: { lag: number; w: number } | null = null;
  for (const { w, phase } of crossings) {
    const lag = lagToMinusOne(phase);
    if (least === null || lag < least.lag) least = { lag, w };
  }
  return least;
}

/**
 * Least extra dead time that brings a gain crossover to -1 and that crossover, which need not be that of the phase
 * margin. Without dead time and with |L| ≥ 1 at infinity any dead time is too much.
 */
export function delayMargin(
  loop: ScaledLoop,
  crossings: readonly Crossing[],
): { time: number; w: number } | null {
  if (loop.deadTime === 0 && loop.relativeDegree === 0 && loop.lnGain >= 0) return { time: 0, w: Infinity };
  let least: { time: number; w: number } | null = null;
  for (const { w, phase } of crossings) {
    const time = lagToMinusOne(phase) / w;
    if (least === null || time < least.time) least = { time, w };
  }
  return least;
}

function lagToMinusOne(phase: number): number {
  const turn = 2 * Math.PI;
  const lag = (phase + Math.PI) % turn;
  return lag > 0 ? lag : lag + turn;
}
