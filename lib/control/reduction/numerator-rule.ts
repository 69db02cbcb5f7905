/** What becomes of (T0·s+1)/(τ0·s+1): a gain, and a lag in seconds (0 = none). */
export interface SimplifiedPair {
  readonly rule: 'T1' | 'T1a' | 'T1b' | 'T2' | 'T3';
  readonly gain: number;
  readonly lag: number;
}

/**
 * Replaces a numerator factor (T0·s+1) together with a lag (τ0·s+1).
 *
 * @param leadS T0 in seconds, > 0
 * @param lagS τ0 in seconds, > 0
 * @param tauCS wanted closed-loop time constant τc in seconds, ≥ 0
 * Source: Skogestad & Grimholt, The SIMC Method for Smooth PID Controller Tuning (2012), eq. 5.15.
 */
export function numeratorRule(leadS: number, lagS: number, tauCS: number): SimplifiedPair {
  if (leadS >= lagS) {
    if (lagS >= tauCS) return { rule: 'T1', gain: leadS / lagS, lag: 0 };
    if (leadS >= tauCS) return { rule: 'T1a', gain: leadS / tauCS, lag: 0 };
    return { rule: 'T1b', gain: 1, lag: 0 };
  }
  if (leadS >= 5 * tauCS) return { rule: 'T2', gain: leadS / lagS, lag: 0 };
  const within = Math.min(lagS, 5 * tauCS);
  return { rule: 'T3', gain: within / lagS, lag: within - leadS };
}

/** The lag to pair T0 with: the closest larger one, unless the closest smaller one is closer than 1.6 (or the only). */
export function partnerOf(leadS: number, lags: readonly number[]): number | null {
  const larger = lags.filter((tau) => tau >= leadS);
  const smaller = lags.filter((tau) => tau < leadS);
  if (larger.length === 0) return smaller.length === 0 ? null : Math.max(...smaller);
  const above = Math.min(...larger);
  if (smaller.length === 0) return above;
  const below = Math.max(...smaller);
  // A ratio that is 1.6 but for the rounding of the roots is 1.6.
  return leadS / below < above / leadS && leadS / below < 1.6 - 1e-4 ? below : above;
}
