import { CELL_WIDTH, type ScaledLoop } from './scaled-loop';

const MOST_NODES = 5000;
/** A lightly damped pair nearer to the axis than this fraction of the frequency is not resolved any further. */
const FINEST_STEP = 1e-9;
const UNRESOLVED = 1e-8;
/** The first node lies where the low-frequency asymptote is this far above (or below) 1. */
const ASYMPTOTE_SHARE = 0.01;

/** A point of the loop's curve: ln|L| and unwrapped phase with dead time, their slopes, and bounds of their bends. */
export interface CurveNode {
  readonly w: number;
  readonly ln: number;
  readonly phase: number;
  readonly lnSlope: number;
  readonly phaseSlope: number;
  readonly lnBend: number;
  readonly phaseBend: number;
}

/**
 * Nodes from w = 0 to a frequency beyond which nothing new can happen. Neighbours are so near, compared with the
 * distance to the nearest pole or zero, that between them ln|L| and the phase without dead time are smooth; and the
 * bounds of their second derivatives tell for certain whether they are monotone or can reach a given value.
 */
export interface LoopCurve {
  readonly loop: ScaledLoop;
  readonly nodes: readonly CurveNode[];
}

export function loopCurve(loop: ScaledLoop): LoopCurve {
  const first = originNode(loop);
  const nodes = [first];
  const quietFrom = asymptotesFrom(loop);
  const lnEnd = lnMagnitudeAtInfinity(loop);
  let step = Math.min(CELL_WIDTH * loop.distance, widestFirstStep(loop));
  let node = first;
  let turnsFrom: CurveNode | null = null;
  while (nodes.length < MOST_NODES) {
    node = nodeAfter(loop, node, node.w + step);
    nodes.push(node);
    if (node.w >= quietFrom && onFinalSide(node.ln, lnEnd)) {
      turnsFrom ??= node;
      if (loop.deadTime === 0 || turnsFrom.phase - node.phase >= 2 * Math.PI) break;
    }
    const widest = loop.originOrder === 0 && loop.rootRe.length > 0 ? Infinity : node.w;
    step = Math.max(Math.min(CELL_WIDTH * loop.distance, widest), FINEST_STEP * node.w);
  }
  return { loop, nodes };
}

/** The node at w in the branch of the phase that continues `from`, which must be a neighbour. */
export function nodeAfter(loop: ScaledLoop, from: CurveNode, w: number): CurveNode {
  loop.evaluate(w);
  loop.bend(w);
  const phaseSlope = loop.phaseSlope - loop.deadTime;
  return {
    w,
    ln: loop.lnMagnitude,
    phase: continuedPhase(loop, from, w),
    lnSlope: loop.lnSlope,
    phaseSlope,
    // Magnitude of the integrators' own bend, order/w², is largest at the lower end of a cell.
    lnBend: loop.lnBend + (from.w > 0 ? Math.abs(loop.originOrder) / (from.w * from.w) : 0),
    phaseBend: loop.phaseBend,
  };
}

/** Phase with dead time at the w last evaluated, in the branch nearest to what the slopes predict from `from`. */
export function continuedPhase(loop: ScaledLoop, from: CurveNode, w: number): number {
  // Across a root on the axis the slopes say nothing; in steps this small the phase without dead time hardly moves.
  const unresolved = w - from.w < UNRESOLVED * w;
  const slope = unresolved ? 0 : (from.phaseSlope + loop.deadTime + loop.phaseSlope) / 2;
  const expected = from.phase + loop.deadTime * from.w + (w - from.w) * slope;
  const turns = Math.round((expected - loop.phase) / (2 * Math.PI));
  return loop.phase + turns * 2 * Math.PI - loop.deadTime * w;
}

function originNode(loop: ScaledLoop): CurveNode {
  loop.evaluate(0);
  loop.bend(0);
  const order = loop.originOrder;
  return {
    w: 0,
    ln: order === 0 ? loop.lnMagnitude : order * Infinity,
    phase: lowPhase(loop),
    lnSlope: order === 0 ? 0 : -order * Infinity,
    phaseSlope: loop.phaseSlope - loop.deadTime,
    lnBend: loop.lnBend,
    phaseBend: loop.phaseBend,
  };
}

/** Phase of the low-frequency asymptote: -90° per integrator, and -180° for a negative gain. */
export function lowPhase(loop: ScaledLoop): number {
  return (-Math.PI / 2) * loop.originOrder - (loop.lowSign < 0 ? Math.PI : 0);
}

/** ln of lim |L| for w -> infinity, dead time left out: -Infinity for a loop with more poles than zeros. */
export function lnMagnitudeAtInfinity(loop: ScaledLoop): number {
  return loop.relativeDegree > 0 ? -Infinity : loop.lnGain;
}

function onFinalSide(ln: number, lnEnd: number): boolean {
  return Math.abs(lnEnd) < 1e-12 || Math.sign(ln) === Math.sign(lnEnd);
}

/** With integrators the first cell ends where the asymptote is still far from 1, so that |L| = 1 is not inside. */
function widestFirstStep(loop: ScaledLoop): number {
  if (loop.originOrder === 0) return loop.rootRe.length > 0 ? Infinity : 0.5;
  return ASYMPTOTE_SHARE * Math.exp(loop.lnLowGain / loop.originOrder);
}

/**
 * Frequency from which the first terms of the expansion in 1/w rule: |L| is monotone there, and without dead time the
 * phase stays on one side of its limit; with dead time the dead time turns faster than all poles and zeros.
 */
function asymptotesFrom(loop: ScaledLoop): number {
  const count = loop.rootRe.length;
  if (count === 0) return 0;
  let largest = 0;
  let phaseTerm = 0;
  let lnTerm = 0;
  let turning = 0;
  for (let i = 0; i < count; i += 1) {
    const re = loop.rootRe[i];
    const im = loop.rootIm[i];
    largest = Math.max(largest, Math.sqrt(re * re + im * im));
    phaseTerm -= loop.rootWeight[i] * re;
    lnTerm += 0.5 * loop.rootWeight[i] * (re * re - im * im);
    turning += Math.abs(re);
  }
  const floor = 1e-8;
  const monotone =
    loop.relativeDegree > 0
      ? largest * Math.sqrt((1.4 * count) / loop.relativeDegree)
      : largest * largest * Math.sqrt((4 * count) / Math.max(Math.abs(lnTerm), floor * largest * largest));
  const turned =
    loop.deadTime > 0
      ? Math.sqrt((1.4 * turning) / loop.deadTime)
      : largest *
        Math.max(
          1.2 * count,
          Math.sqrt((2 * count * largest) / Math.max(Math.abs(phaseTerm), floor * largest)),
        );
  return Math.max(4 * largest, monotone, turned);
}
