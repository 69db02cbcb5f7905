import type { LimitMode, LoopEquations } from './loop-equations';
import { NODE_FRACTIONS } from './pieces';

/**
 * Which mode the loop asks for after `resolve`. Every mode is left only `margin` beyond its border, so that nothing
 * chatters.
 *
 * @param rate dv/dx, asked for only while the output is free and its rate limited
 */
export function wantedMode(equations: LoopEquations, margin: number, rate: () => number): LimitMode {
  const { v, output, mode, excitation } = equations;
  const { low, high, slew } = excitation;
  const beyond = (limit: number) => margin * (1 + Math.abs(limit));
  switch (mode) {
    case 'high':
      return v < high - beyond(high) ? 'free' : 'high';
    case 'low':
      return v > low + beyond(low) ? 'free' : 'low';
    case 'rising':
      if (output > high + beyond(high)) return 'high';
      return output > v + beyond(v) ? 'free' : 'rising';
    case 'falling':
      if (output < low - beyond(low)) return 'low';
      return output < v - beyond(v) ? 'free' : 'falling';
    case 'free': {
      if (v > high + beyond(high)) return 'high';
      if (v < low - beyond(low)) return 'low';
      if (equations.ramp < 0) return 'free';
      const rateNow = rate();
      if (Math.abs(rateNow) <= slew * (1 + 1e-6)) return 'free';
      return rateNow > 0 ? 'rising' : 'falling';
    }
  }
}

/**
 * The first moment in (from, to] at which `stays` no longer holds, found by halving on the step's interpolation; null
 * when it holds throughout.
 */
export function firstChange(from: number, to: number, stays: (x: number) => boolean): number | null {
  let before = from;
  for (const fraction of NODE_FRACTIONS.slice(1)) {
    let after = fraction === 1 ? to : from + fraction * (to - from);
    if (!stays(after)) {
      for (;;) {
        const middle = (before + after) / 2;
        if (middle <= before || middle >= after || after - before <= 1e-15 * to) return after;
        if (stays(middle)) before = middle;
        else after = middle;
      }
    }
    before = after;
  }
  return null;
}
