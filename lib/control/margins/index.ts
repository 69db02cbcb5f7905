import { unitGainCrossings } from '../frequency/crossings';
import { loopCurve } from '../frequency/curve';
import { loopFactors } from '../frequency/loop-factors';
import { ScaledLoop } from '../frequency/scaled-loop';
import { openLoop } from '../loop';
import { isZero } from '../polynomial';
import { stableByCount, stableByPolynomial } from '../stability';
import type { IdealController, Margins, Plant } from '../types';
import { limitGains } from './gain-margin';
import { delayMargin, phaseMargin } from './phase-margin';
import { sensitivityPeak } from './peaks';

export interface LoopAnalysis {
  readonly stable: boolean;
  readonly margins: Margins;
}

/**
 * Stability and robustness figures of L = Cy·G·F with the exact dead time.
 *
 * - gainMargin: smallest factor k > 1 with 1 + k·L(jw) = 0 for a w in [0, ∞], Infinity if none; gainMarginLow: largest
 *   k < 1 likewise, 0 if none. Limits count: w = 0 where L(0) < 0; w = ∞ without dead time where L(∞) < 0, with dead
 *   time where L(∞) ≠ 0. phaseCrossover and phaseCrossoverLow are their frequencies, null if none.
 * - phaseMarginDeg: least phase lag in (0, 360] that brings a gain crossover to -1, at gainCrossover; Infinity and null
 *   where |L| never crosses 1.
 * - delayMarginS: least extra dead time that reaches the limit, at delayMarginFrequency; 0 at Infinity without dead
 *   time where |L(∞)| ≥ 1; Infinity without crossover.
 * - ms, mt: largest |1/(1 + L)| and |L/(1 + L)| over [0, ∞], limits included.
 *
 * Frequencies in rad/s. In an unstable loop phase margin, delay margin, ms and mt are null; the gain factors are still
 * the crossings of the definition and promise no safety.
 * @throws RangeError for a plant or controller outside its range
 */
export function analyseLoop(plant: Plant, controller: IdealController): LoopAnalysis {
  const transfer = openLoop(plant, controller);
  const decided = stableByPolynomial(transfer);
  if (isZero(transfer.num)) return { stable: decided === true, margins: marginsOfZero(decided === true) };
  const loop = new ScaledLoop(transfer, loopFactors(plant, controller));
  const curve = loopCurve(loop);
  const crossings = unitGainCrossings(curve);
  const stable = decided ?? stableByCount(loop, crossings);
  const limits = limitGains(curve);
  const radS = (w: number | undefined) => (w === undefined ? null : w * loop.unitRadS);
  const gains = {
    gainMargin: limits.above === null ? Infinity : Math.exp(limits.above.lnFactor),
    gainMarginDb: limits.above === null ? Infinity : decibels(limits.above.lnFactor),
    gainMarginLow: limits.below === null ? 0 : Math.exp(limits.below.lnFactor),
    phaseCrossover: radS(limits.above?.w),
    phaseCrossoverLow: radS(limits.below?.w),
  };
  if (!stable) return { stable, margins: { ...gains, ...NOT_DEFINED } };
  const phase = phaseMargin(crossings);
  const delay = delayMargin(loop, crossings);
  const ms = sensitivityPeak(curve, 'S', limits);
  const mt = sensitivityPeak(curve, 'T', limits);
  return {
    stable,
    margins: {
      ...gains,
      phaseMarginDeg: phase === null ? Infinity : (phase.lag * 180) / Math.PI,
      gainCrossover: radS(phase?.w),
      delayMarginS: delay === null ? Infinity : delay.time / loop.unitRadS,
      delayMarginFrequency: radS(delay?.w),
      ms: ms.value,
      msFrequency: radS(ms.w),
      mt: mt.value,
      mtFrequency: radS(mt.w),
    },
  };
}

/** The margins alone; see analyseLoop. */
export function computeMargins(plant: Plant, controller: IdealController): Margins {
  return analyseLoop(plant, controller).margins;
}

const NOT_DEFINED = {
  phaseMarginDeg: null,
  gainCrossover: null,
  delayMarginS: null,
  delayMarginFrequency: null,
  ms: null,
  msFrequency: null,
  mt: null,
  mtFrequency: null,
};

/** L = 0: nothing to cross, S = 1 and T = 0 everywhere. */
function marginsOfZero(stable: boolean): Margins {
  const gains = {
    gainMargin: Infinity,
    gainMarginDb: Infinity,
    gainMarginLow: 0,
    phaseCrossover: null,
    phaseCrossoverLow: null,
  };
  if (!stable) return { ...gains, ...NOT_DEFINED };
  const infinite = {
    phaseMarginDeg: Infinity,
    gainCrossover: null,
    delayMarginS: Infinity,
    delayMarginFrequency: null,
  };
  return { ...gains, ...infinite, ms: 1, msFrequency: 0, mt: 0, mtFrequency: 0 };
}

function decibels(lnFactor: number): number {
  return (20 * lnFactor) / Math.LN10;
}
