import { Cubic } from '../metrics/cubic';
import type { LastPair } from './integrator';

const cubic = new Cubic();
const turning = new Float64Array(2);

/** First place in a cubic, 0 to 1, from which sign·(v − level) is positive; −1 where it nowhere is. */
function firstBeyond(level: number, sign: number): number {
  const beyond = (x: number) => sign * (cubic.at(x) - level) > 0;
  if (beyond(0)) return 0;
  const count = cubic.stationary(turning);
  let from = 0;
  for (let k = 0; k <= count; k += 1) {
    const to = k < count ? turning[k] : 1;
    if (beyond(to)) return cubic.crossing(level, from, to);
    from = to;
  }
  return -1;
}

/** First time within the last two pieces at which v is above `top` or below `bottom`; null where it stays between. */
export function timeOutside({ pairV, trajectory }: LastPair, bottom: number, top: number): number | null {
  const { t, count } = trajectory;
  for (let piece = count - 2, at = 0; piece < count; piece += 1, at += 4) {
    const h = t[piece + 1] - t[piece];
    cubic.fromEnds(h, pairV[at], pairV[at + 1], pairV[at + 2], pairV[at + 3]);
    const above = firstBeyond(top, 1);
    const below = firstBeyond(bottom, -1);
    const first = above < 0 || (below >= 0 && below < above) ? below : above;
    if (first >= 0) return t[piece] + first * h;
  }
  return null;
}
