import { ok, refuse, type Result } from '../result';
import { loopCurve } from './frequency/curve';
import { scaledLoop, type ScaledLoop } from './frequency/scaled-loop';
import { limitGains } from './margins/gain-margin';
import { trimmed } from './polynomial';
import { isStable } from './stability';
import { idealController, type Plant } from './types';

export interface UltimatePoint {
  /** Proportional gain at the limit, with the sign of the plant's gain. */
  readonly ku: number;
  /** Period of the sustained oscillation, s. */
  readonly tu: number;
  /** Its frequency, rad/s. */
  readonly wu: number;
}

export type NoUltimatePoint = 'NO_ULTIMATE_POINT' | 'NO_STABLE_GAIN';

/** Distance, relative, at which the loop is judged on both sides of a limit. */
const BESIDE = 1e-6;
const MOST_LIMITS = 40;
/** ln of a gain below every limit. */
const LN_NO_GAIN = -700;

/**
 * Ultimate gain and period: the proportional gain of smallest size at which a stable P loop around the plant reaches
 * sustained oscillation, with exact dead time.
 *
 * - First order with dead time: w·θ + atan(w·τ) = π and ku = √(1 + (w·τ)²)/K. Integrator with dead time: ku = π/(2·K·θ).
 * - NO_ULTIMATE_POINT: stable gains exist but none of their limits oscillates (first and second order without dead
 *   time, for instance). NO_STABLE_GAIN: no proportional gain of the right sign stabilises the plant.
 * @throws RangeError for a plant outside its range
 * Source: the experiment of Ziegler and Nichols (1942), solved on the plant instead of tried.
 */
export function ultimatePoint(plant: Plant): Result<UltimatePoint, NoUltimatePoint> {
  const sign = stabilisingSign(plant);
  const loop = scaledLoop(plant, idealController({ kp: sign }));
  if (loop === null) return refuse('NO_ULTIMATE_POINT', 'The plant has no gain: its numerator is zero.');
  const curve = loopCurve(loop);
  const stableAt = (lnGain: number) => isStable(plant, idealController({ kp: sign * Math.exp(lnGain) }));
  let someStable = false;
  let lnLevel = LN_NO_GAIN;
  for (let count = 0; count < MOST_LIMITS; count += 1) {
    const limit = limitGains(curve, lnLevel).above;
    if (limit === null) break;
    lnLevel = limit.lnFactor;
    const borders = stableAt(lnLevel - BESIDE) || stableAt(lnLevel + BESIDE);
    someStable ||= borders;
    if (borders && limit.w > 0 && limit.w < Infinity) return ok(pointAt(loop, sign, limit));
  }
  if (someStable || stableAt(lnLevel === LN_NO_GAIN ? -loop.lnLowGain : lnLevel + 1))
    return refuse(
      'NO_ULTIMATE_POINT',
      'No proportional gain makes this loop oscillate steadily: with gains of the right sign its phase does not reach ' +
        '-180° at a frequency above zero. Ultimate-gain rules need a plant with dead time or of third order.',
    );
  return refuse(
    'NO_STABLE_GAIN',
    'No proportional gain stabilises this plant, so there is no stable loop that could be brought to its limit.',
  );
}

function pointAt(loop: ScaledLoop, sign: number, limit: { lnFactor: number; w: number }): UltimatePoint {
  const wu = limit.w * loop.unitRadS;
  return { ku: sign * Math.exp(limit.lnFactor), tu: (2 * Math.PI) / wu, wu };
}

/**
 * Sign of the lowest coefficient of num for a monic den: the static gain's sign, turned once per pole on the right.
 * With an odd number of those only gains of this sign can stabilise.
 */
function stabilisingSign({ num, den }: Plant): 1 | -1 {
  const lowest = num.findLast((c) => c !== 0) ?? 1;
  return lowest * trimmed(den)[0] < 0 ? -1 : 1;
}
