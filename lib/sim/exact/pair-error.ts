import type { LastPair } from './integrator';

/** Errors of the cubics of a pair of pieces. */
export interface PairError {
  y: number;
  v: number;
}

/**
 * How far one cubic over the last two pieces, equally long, misses value and slope between them, as the error of each
 * piece by itself: it grows with the fourth power of the length, so that each is off by a sixteenth of what both are.
 */
export function pairError({ trajectory, pairV }: LastPair, into: PairError): void {
  const { t, y0, dy0, y1, dy1 } = trajectory;
  const second = trajectory.count - 1;
  const first = second - 1;
  const h = 0.5 * (t[second + 1] - t[first]);
  into.y = miss(h, y0[first], dy0[first], y1[second], dy1[second], y1[first], dy1[first]);
  into.v = miss(h, pairV[0], pairV[1], pairV[6], pairV[7], pairV[2], pairV[3]);
}

function miss(h: number, v0: number, d0: number, v1: number, d1: number, v: number, d: number): number {
  const value = 0.5 * (v0 + v1) + 0.25 * h * (d0 - d1) - v;
  const slope = 0.75 * (v1 - v0) - 0.25 * h * (d0 + d1) - h * d;
  return Math.max(Math.abs(value), 0.25 * Math.abs(slope)) / 16;
}
