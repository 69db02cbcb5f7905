import type { Trajectory } from '../metrics';

/** Errors of the last two pieces of a trajectory, and of one piece in place of both. */
export interface PairError {
  y: number;
  u: number;
  wholeY: number;
  wholeU: number;
}

/**
 * How far one cubic over the last two pieces, equally long, misses value and slope between them. A cubic's error
 * grows with the fourth power of its length (that of the slope in the middle with the fifth), so that each piece by
 * itself is off by a sixteenth; a jump or kink between the pieces shows in full.
 */
export function pairError(trajectory: Trajectory, into: PairError): void {
  const second = trajectory.count - 1;
  const first = second - 1;
  const h = trajectory.t[second] - trajectory.t[first];
  const { y0, dy0, y1, dy1, u0, du0, u1, du1 } = trajectory;
  let value = 0;
  let slope = 0;
  const miss = (
    v0: number,
    d0: number,
    v1: number,
    d1: number,
    before: number,
    dBefore: number,
    after: number,
    dAfter: number,
  ) => {
    const middle = 0.5 * (v0 + v1) + 0.25 * h * (d0 - d1);
    const middleSlope = 0.75 * (v1 - v0) - 0.25 * h * (d0 + d1);
    value = Math.max(Math.abs(middle - before), Math.abs(middle - after));
    slope = 0.25 * Math.max(Math.abs(middleSlope - h * dBefore), Math.abs(middleSlope - h * dAfter));
  };
  miss(y0[first], dy0[first], y1[second], dy1[second], y1[first], dy1[first], y0[second], dy0[second]);
  into.wholeY = Math.max(value, slope);
  into.y = into.wholeY / 16;
  miss(u0[first], du0[first], u1[second], du1[second], u1[first], du1[first], u0[second], du0[second]);
  into.wholeU = Math.max(value, slope);
  into.u = into.wholeU / 16;
}
