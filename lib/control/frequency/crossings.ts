import { continuedPhase, nodeAfter, type CurveNode, type LoopCurve } from './curve';
import type { ScaledLoop } from './scaled-loop';

/** The two quantities of the curve whose crossings are looked for. */
export type Quantity = 'ln' | 'phase';

const DEEPEST_SPLIT = 40;
/** Enough for any loop that means anything; beyond it a crossing is found more coarsely. */
const MOST_SPLITS = 100_000;
/** A stretch that cannot leave this band around the wanted value touches it rather than crosses it. */
const TOUCHING = 1e-11;
/** ln|L(0)| this small is 0 to rounding: the curve starts on |L| = 1 and does not cross it there. */
export const STARTS_ON_ONE = 1e-14;
const WIDTH_LIMIT = 1e-8;

/** Between neighbours a and b, is the quantity certain to be monotone? */
export function isMonotone(a: CurveNode, b: CurveNode, quantity: Quantity): boolean {
  const [slopeA, slopeB] = quantity === 'ln' ? [a.lnSlope, b.lnSlope] : [a.phaseSlope, b.phaseSlope];
  if (slopeA * slopeB < 0) return false;
  return Math.abs(slopeA) + Math.abs(slopeB) >= bendBound(a, b, quantity) * (b.w - a.w);
}

function bendBound(a: CurveNode, b: CurveNode, quantity: Quantity): number {
  return quantity === 'ln' ? Math.max(a.lnBend, b.lnBend) : Math.max(a.phaseBend, b.phaseBend);
}

/** By how much the quantity can leave the range between its values at a and b. */
export function slack(a: CurveNode, b: CurveNode, quantity: Quantity): number {
  return (bendBound(a, b, quantity) * (b.w - a.w) ** 2) / 8;
}

/** A cell so narrow that a pole or zero on the imaginary axis lies in it: |L| is next to infinite or to zero there. */
export function isSingular(a: CurveNode, b: CurveNode): boolean {
  return b.w - a.w < WIDTH_LIMIT * b.w && Math.max(a.lnBend, b.lnBend) * (b.w - a.w) ** 2 > 1;
}

export function middle(loop: ScaledLoop, a: CurveNode, b: CurveNode): CurveNode {
  return nodeAfter(loop, a, (a.w + b.w) / 2);
}

/** All frequencies at which |L| = 1, ascending, each with its phase. */
export function unitGainCrossings({ loop, nodes }: LoopCurve): { w: number; phase: number }[] {
  const found: { w: number; phase: number }[] = [];
  let splitsLeft = MOST_SPLITS;
  for (let i = 1; i < nodes.length; i += 1)
    if (!isSingular(nodes[i - 1], nodes[i])) search(nodes[i - 1], nodes[i], 0);
  return found;

  function search(a: CurveNode, b: CurveNode, depth: number): void {
    const reach = slack(a, b, 'ln');
    if (Math.min(a.ln, b.ln) - reach > 0 || Math.max(a.ln, b.ln) + reach < 0) return;
    const touches = Math.abs(a.ln) + Math.abs(b.ln) + reach < TOUCHING;
    if (isMonotone(a, b, 'ln') || touches || depth === DEEPEST_SPLIT || splitsLeft === 0) {
      const startsThere = a.w === 0 && Math.abs(a.ln) <= STARTS_ON_ONE;
      if (a.ln > 0 !== b.ln > 0 && !startsThere) found.push(solve(loop, a, b, 'ln', 0));
      return;
    }
    splitsLeft -= 1;
    const between = middle(loop, a, b);
    search(a, between, depth + 1);
    search(between, b, depth + 1);
  }
}

/**
 * The frequency between neighbours a and b at which the quantity takes the value: Newton's method, kept inside a
 * bracket that halves when a step leaves it.
 */
export function solve(
  loop: ScaledLoop,
  a: CurveNode,
  b: CurveNode,
  quantity: Quantity,
  value: number,
): { w: number; ln: number; phase: number } {
  let low = a.w;
  let high = b.w;
  const rising = (quantity === 'ln' ? b.ln : b.phase) > value;
  let w =
    quantity === 'phase' ? low + ((high - low) * (value - a.phase)) / (b.phase - a.phase) : (low + high) / 2;
  let phase = 0;
  for (let round = 0; round < 100; round += 1) {
    if (!(w > low && w < high)) w = (low + high) / 2;
    loop.evaluate(w);
    phase = continuedPhase(loop, a, w);
    const error = (quantity === 'ln' ? loop.lnMagnitude : phase) - value;
    if (error === 0) break;
    if (error > 0 === rising) high = w;
    else low = w;
    const slope = quantity === 'ln' ? loop.lnSlope : loop.phaseSlope - loop.deadTime;
    const next = w - error / slope;
    if (Math.abs(next - w) <= 2e-16 * w || high - low <= 2e-16 * high) break;
    w = next;
  }
  return { w, ln: loop.lnMagnitude, phase };
}
