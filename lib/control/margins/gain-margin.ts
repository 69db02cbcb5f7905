import { lnMagnitudeAtInfinity, type CurveNode, type LoopCurve } from '../frequency/curve';
import { isMonotone, isSingular, middle, slack, solve } from '../frequency/crossings';

const DEEPEST_SPLIT = 40;
/** A dead time that turns the phase by millions of rounds must not keep the search going: then it gets coarser. */
const MOST_SPLITS = 100_000;
const TOUCHING = 1e-11;
/** Gains that differ by less, relative, are the same limit reached at several frequencies. */
const SAME = 1e-12;
const TURN = 2 * Math.PI;

/** A gain factor k = exp(lnFactor) with 1 + k·L(jw) = 0. */
export interface LimitGain {
  readonly lnFactor: number;
  readonly w: number;
}

export interface LimitGains {
  /** Smallest factor above, largest factor below the level asked for; null where there is none. */
  readonly above: LimitGain | null;
  readonly below: LimitGain | null;
}

/**
 * The gain factors next to exp(lnLevel) that bring the loop to the stability limit: phase crossovers, and the limits
 * w = 0 and w -> infinity where L is real and negative (or, with dead time, |L| has a limit: crossovers pile up there).
 *
 * Between neighbouring nodes where ln|L| and phase are both monotone only the first and the last crossover can be
 * next to the level, however many turns the dead time makes between them.
 */
export function limitGains({ loop, nodes }: LoopCurve, lnLevel = 0): LimitGains {
  let above: LimitGain | null = null;
  let below: LimitGain | null = null;
  let splitsLeft = MOST_SPLITS;

  function offer(lnFactor: number, w: number): void {
    if (lnFactor > lnLevel + SAME) {
      if (above === null || lnFactor < above.lnFactor - SAME) above = { lnFactor, w };
    } else if (lnFactor < lnLevel - SAME) {
      if (below === null || lnFactor > below.lnFactor + SAME) below = { lnFactor, w };
    }
  }

  /** Can a crossover between neighbours be nearer to the level than those known? */
  function canImprove(a: CurveNode, b: CurveNode): boolean {
    const reach = slack(a, b, 'ln');
    const tooLarge = above !== null && -Math.max(a.ln, b.ln) - reach > above.lnFactor;
    const tooSmall = below !== null && -Math.min(a.ln, b.ln) + reach < below.lnFactor;
    return !tooLarge && !tooSmall;
  }

  function search(a: CurveNode, b: CurveNode, depth: number): void {
    const reach = slack(a, b, 'phase');
    const lowest = Math.min(a.phase, b.phase) - reach;
    const highest = Math.max(a.phase, b.phase) + reach;
    if (targetsUpTo(highest) === targetsUpTo(lowest) || !canImprove(a, b)) return;
    const first = targetsUpTo(Math.min(a.phase, b.phase)) + 1;
    const last = targetsUpTo(Math.max(a.phase, b.phase));
    const touches = highest - lowest < TOUCHING;
    const settled = isMonotone(a, b, 'phase') || touches || depth === DEEPEST_SPLIT;
    if ((settled && (last <= first || isOneSided(a, b, lnLevel))) || splitsLeft === 0) {
      for (const target of last > first ? [first, last] : last === first ? [first] : []) {
        if (a.w === 0 && Math.abs(targetPhase(target) - a.phase) < TOUCHING / 1e3) continue;
        const crossing = solve(loop, a, b, 'phase', targetPhase(target));
        offer(-crossing.ln, crossing.w);
      }
      return;
    }
    if (depth === DEEPEST_SPLIT) return;
    splitsLeft -= 1;
    const between = middle(loop, a, b);
    search(a, between, depth + 1);
    search(between, b, depth + 1);
  }

  if (loop.originOrder === 0 && loop.lowSign < 0) offer(-loop.lnLowGain, 0);
  for (let i = 1; i < nodes.length; i += 1)
    if (!isSingular(nodes[i - 1], nodes[i])) search(nodes[i - 1], nodes[i], 0);
  const lnEnd = lnMagnitudeAtInfinity(loop);
  if (lnEnd > -Infinity && (loop.deadTime > 0 || loop.gainSign < 0)) offer(-lnEnd, Infinity);
  return { above, below };
}

/** Is ln|L| certain to be monotone between neighbours, and to stay on one side of the level? */
function isOneSided(a: CurveNode, b: CurveNode, lnLevel: number): boolean {
  return isMonotone(a, b, 'ln') && -a.ln > lnLevel === -b.ln > lnLevel;
}

/** Number n of the highest target (2n + 1)·π that is not above the phase. */
function targetsUpTo(phase: number): number {
  return Math.floor((phase - Math.PI) / TURN);
}

function targetPhase(n: number): number {
  return (2 * n + 1) * Math.PI;
}
