import type { LoadResponse, SetpointResponse } from '../types';
import { errorIntegrals, extreme, firstReach, lastExit, resample, totalVariation } from './scan';
import type { Trajectory } from './trajectory';

export { Trajectory } from './trajectory';

export interface MetricOptions {
  readonly horizonS: number;
  /** Limit of y for t → ∞. */
  readonly final: number;
  /** Points of the curves handed back. */
  readonly points: number;
}

/** Below this a maximum is taken for the final value being reached, % of it. */
const NO_OVERSHOOT_PCT = 0.01;
/** Share of the final value, or of the peak after a load step, within which a response counts as settled. */
const BAND = 0.02;
/** A load response whose peak does not stand out this far from its final value creeps up to it. */
const CREEPING = 1e-4;

/**
 * Figures of a unit set-point step from rest over [0, horizonS]: overshoot 100·max(0, max y − yss)/|yss|, first peak,
 * rise from 10 to 90 %, last exit from ±2 %, integrals of e = 1 − y, and what the controller output does from 0+ on.
 * riseTimeS and settlingTimeS are null when y does not get there within the horizon.
 */
export function setpointMetrics(trajectory: Trajectory, options: MetricOptions): SetpointResponse {
  const { horizonS, final, points } = options;
  const sign = final < 0 ? -1 : 1;
  const top = extreme(trajectory, 'y', 1);
  const overshoot = final === 0 ? 0 : (100 * Math.max(0, top.value - final)) / Math.abs(final);
  const low = firstReach(trajectory, 0.1 * final, sign);
  const high = firstReach(trajectory, 0.9 * final, sign);
  const integrals = errorIntegrals(trajectory, 1);
  return {
    horizonS,
    final,
    overshootPct: overshoot,
    peakTimeS: overshoot < NO_OVERSHOOT_PCT ? null : top.time,
    riseTimeS: low === null || high === null ? null : high - low,
    settlingTimeS: Number.isFinite(final) ? lastExit(trajectory, final, BAND * Math.abs(final)) : null,
    steadyError: 1 - final,
    iae: integrals.absolute,
    ise: integrals.squared,
    itae: integrals.timeAbsolute,
    controlPeak: Math.abs(extreme(trajectory, 'u', 0).value),
    totalVariation: totalVariation(trajectory),
    ...resample(trajectory, horizonS, points),
  };
}

/**
 * Figures of a unit load step at the plant input, set-point 0: the signed y of largest size, the last exit from ±2 %
 * of it around the final value, and ∫|y|. peakTimeS is null when y creeps up to its final value.
 */
export function loadMetrics(trajectory: Trajectory, options: MetricOptions): LoadResponse {
  const { horizonS, final, points } = options;
  const peak = extreme(trajectory, 'y', 0);
  const creeps = Math.abs(peak.value) <= Math.abs(final) * (1 + CREEPING);
  return {
    horizonS,
    peak: peak.value,
    peakTimeS: creeps ? null : peak.time,
    final,
    recoveryTimeS: Number.isFinite(final) ? lastExit(trajectory, final, BAND * Math.abs(peak.value)) : null,
    iae: errorIntegrals(trajectory, 0).absolute,
    ...resample(trajectory, horizonS, points),
  };
}

/**
 * Time after which y stays within a share of its final value ('final') or of its largest size ('peak') around the
 * final value, s; null when it is outside at the end. With a final value of 0, the largest size is taken.
 */
export function settledAfter(
  trajectory: Trajectory,
  final: number,
  share: number,
  of: 'final' | 'peak',
): number | null {
  if (!Number.isFinite(final)) return null;
  const size = of === 'final' && final !== 0 ? Math.abs(final) : Math.abs(extreme(trajectory, 'y', 0).value);
  return lastExit(trajectory, final, share * size);
}
