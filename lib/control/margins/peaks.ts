import { lnMagnitudeAtInfinity, nodeAfter, type CurveNode, type LoopCurve } from '../frequency/curve';
import { isSingular, middle, slack } from '../frequency/crossings';
import type { ScaledLoop } from '../frequency/scaled-loop';
import type { LimitGains } from './gain-margin';

/** Sensitivity 1/(1 + L), or complementary sensitivity L/(1 + L). */
export type Sensitivity = 'S' | 'T';

export interface Peak {
  readonly value: number;
  /** Frequency of the peak, 0 or Infinity where it is a limit. */
  readonly w: number;
}

/** Stretches of the curve this short (rad, and as much in ln|L|) have at most one peak inside. */
const SHORT = 0.25;
const DEEPEST_SPLIT = 60;
/** A dead time that turns the phase by millions of rounds must not keep the search going: then it gets coarser. */
const MOST_SPLITS = 100_000;
/** Below |L| = 1/50 the curve is next to the origin, and its size need not be resolved. */
const LN_NEGLIGIBLE = -4;
/** |L| or its distance from L(∞) is below 1e-6 of its last value there. */
const TAIL_OCTAVES = 20;
/** The search leaves out what is this little above the best known, relative and times the value: rounding. */
const MARGIN = 1e-12;
/** Peaks that differ by less, relative, are equal: the lowest frequency is named, limits first. */
const SAME = 1e-11;

/**
 * Largest |S| or |T| over 0 ≤ w ≤ infinity, limits included, by branch and bound: a stretch of the curve lies in a
 * box in ln|L| and phase, whose distance from -1 says whether the stretch can hold a higher peak than the best known.
 *
 * T is S with 1/L in the place of L, so one search serves both.
 */
export function sensitivityPeak({ loop, nodes }: LoopCurve, which: Sensitivity, limits: LimitGains): Peak {
  const sign = which === 'S' ? 1 : -1;
  const ends = endPeak(loop, sign);
  let best: Peak | null = null;
  let known = 0;
  let splitsLeft = MOST_SPLITS;
  // Where ln|L| (or -ln|L| for T) is outside this band, |L| alone keeps the value below the best known.
  let bandLow = -Infinity;
  let bandHigh = Infinity;

  function raise(value: number): void {
    const surely = value * (1 - Math.min(1e-3, MARGIN * Math.max(1, value)));
    if (surely <= known) return;
    known = surely;
    bandLow = known > 1 ? Math.log1p(-1 / known) : -Infinity;
    bandHigh = Math.log1p(1 / known);
  }

  function search(a: CurveNode, b: CurveNode, depth: number): void {
    const lnReach = slack(a, b, 'ln');
    const lnLow = Math.min(sign * a.ln, sign * b.ln) - lnReach;
    const lnHigh = Math.max(sign * a.ln, sign * b.ln) + lnReach;
    if (lnHigh < bandLow || lnLow > bandHigh) return;
    const phaseReach = slack(a, b, 'phase');
    const phaseLow = Math.min(a.phase, b.phase) - phaseReach;
    const phaseHigh = Math.max(a.phase, b.phase) + phaseReach;
    if (highestInBox(lnLow, lnHigh, phaseLow, phaseHigh) <= known) return;
    const short = phaseHigh - phaseLow < SHORT && (lnHigh - lnLow < SHORT || lnHigh < LN_NEGLIGIBLE);
    if (!short && depth < DEEPEST_SPLIT && splitsLeft > 0) {
      splitsLeft -= 1;
      const between = middle(loop, a, b);
      search(a, between, depth + 1);
      search(between, b, depth + 1);
      return;
    }
    tryPeak(a.w === 0 ? nudged(loop, a, b) : a, b);
  }

  function tryPeak(a: CurveNode, b: CurveNode): void {
    if (!(growth(sign, a) > 0 && growth(sign, b) <= 0)) return;
    const peak = climb(loop, a, b, sign);
    raise(peak.value);
    if (best === null || peak.value > best.value * (1 + SAME)) best = peak;
  }

  /** Beyond the last node L is a few terms in 1/w, so that octaves resolve it; with dead time all is before. */
  function searchTail(from: CurveNode, octave: number): void {
    const ln = sign * from.ln;
    if (octave === TAIL_OCTAVES || ln < bandLow || ln > bandHigh) return;
    const next = nodeAfter(loop, from, 2 * from.w);
    tryPeak(from, next);
    searchTail(next, octave + 1);
  }

  raise(ends.value);
  for (const limit of [limits.above, limits.below])
    if (limit !== null) raise(1 / Math.abs(Math.expm1(-sign * limit.lnFactor)));
  for (const node of nodes)
    if (sign * node.ln > bandLow && sign * node.ln < bandHigh) raise(sensitivity(sign * node.ln, node.phase));
  for (let i = 1; i < nodes.length; i += 1)
    if (!isSingular(nodes[i - 1], nodes[i])) search(nodes[i - 1], nodes[i], 0);
  if (loop.deadTime === 0) searchTail(nodes[nodes.length - 1], 0);
  const inside = best as Peak | null;
  if (inside === null) return ends;
  // A limit at infinity that only the crossovers of a pure dead time reach is reached by the first of them.
  const reached = ends.w === Infinity && loop.deadTime > 0 && loop.relativeDegree === 0;
  return inside.value > ends.value * (reached ? 1 - SAME : 1 + SAME) ? inside : ends;
}

/** Upper bound of 1/|1 + L| for ln|L| and phase within the given ranges. */
function highestInBox(lnLow: number, lnHigh: number, phaseLow: number, phaseHigh: number): number {
  const turn = 2 * Math.PI;
  const passesMinusOne = Math.floor((phaseHigh - Math.PI) / turn) > Math.floor((phaseLow - Math.PI) / turn);
  const towards = passesMinusOne ? 1 : Math.max(-Math.cos(phaseLow), -Math.cos(phaseHigh));
  const smallest = Math.exp(lnLow);
  if (smallest === Infinity) return 0;
  const size = Math.min(Math.max(towards, smallest), Math.exp(lnHigh));
  return 1 / Math.sqrt((size - 1) ** 2 + 2 * size * (1 - towards));
}

/** 1/|1 + L| from ln|L| and phase, exact near L = -1. */
function sensitivity(ln: number, phase: number): number {
  if (ln === Infinity) return 0;
  const beyond = Math.expm1(ln);
  const beside = 2 * Math.exp(ln / 2) * Math.cos(phase / 2);
  return 1 / Math.sqrt(beyond * beyond + beside * beside);
}

/** Positive while |S| (sign = 1) or |T| (sign = -1) grows with w. */
function growth(sign: number, at: Pick<CurveNode, 'ln' | 'phase' | 'lnSlope' | 'phaseSlope'>): number {
  const size = Math.exp(sign * at.ln);
  return Math.sin(at.phase) * at.phaseSlope - (size + Math.cos(at.phase)) * sign * at.lnSlope;
}

/** At w = 0 every slope vanishes or is infinite: the stretch is judged from a little further on. */
function nudged(loop: ScaledLoop, origin: CurveNode, b: CurveNode): CurveNode {
  return nodeAfter(loop, origin, b.w * 1e-3);
}

/**
 * The peak between a, where the value grows, and b, where it falls: false position on the growth, halving the weight
 * of an end that stays put (Illinois).
 */
function climb(loop: ScaledLoop, a: CurveNode, b: CurveNode, sign: number): Peak {
  let low = a.w;
  let high = b.w;
  let growthLow = growth(sign, a);
  let growthHigh = growth(sign, b);
  let lastSide = 0;
  let peak = b;
  for (let round = 0; round < 80 && growthHigh < 0 && high - low > 1e-13 * high; round += 1) {
    const guess = low + ((high - low) * growthLow) / (growthLow - growthHigh);
    peak = nodeAfter(loop, a, guess > low && guess < high ? guess : (low + high) / 2);
    const here = growth(sign, peak);
    if (here === 0) break;
    const side = Math.sign(here);
    if (side > 0) {
      low = peak.w;
      growthLow = here;
      if (lastSide === side) growthHigh /= 2;
    } else {
      high = peak.w;
      growthHigh = here;
      if (lastSide === side) growthLow /= 2;
    }
    lastSide = side;
  }
  return { value: sensitivity(sign * peak.ln, peak.phase), w: peak.w };
}

/** The larger of the limits of |S| or |T| at w = 0 and w -> infinity. */
function endPeak(loop: ScaledLoop, sign: number): Peak {
  const lnLow = loop.originOrder === 0 ? loop.lnLowGain : loop.originOrder * Infinity;
  const lnEnd = lnMagnitudeAtInfinity(loop);
  const atZero = sensitivity(sign * lnLow, loop.lowSign < 0 ? Math.PI : 0);
  // With dead time L(jw) keeps turning, so that its phase comes back to -180° for ever.
  const atInfinity = sensitivity(sign * lnEnd, loop.deadTime > 0 || loop.gainSign < 0 ? Math.PI : 0);
  return atInfinity > atZero * (1 + SAME) ? { value: atInfinity, w: Infinity } : { value: atZero, w: 0 };
}
