import type { LimitMode, LoopEquations } from './loop-equations';
import { NODE_FRACTIONS } from './pieces';

/** Which mode the present v asks for; a held output is let go only `margin` inside its limit, so that nothing chatters. */
export function wantedMode(equations: LoopEquations, margin: number): LimitMode {
  const { v, mode, excitation } = equations;
  const { low, high } = excitation;
  const highMargin = margin * (1 + Math.abs(high));
  const lowMargin = margin * (1 + Math.abs(low));
  if (v > (mode === 'high' ? high - highMargin : high + highMargin)) return 'high';
  if (v < (mode === 'low' ? low + lowMargin : low - lowMargin)) return 'low';
  return 'free';
}

/** Puts the equations into the mode that holds now: at the start, after a jump, after a change. */
export function settleMode(equations: LoopEquations, margin: number, resolve: () => void): void {
  for (let attempt = 0; attempt < 3; attempt += 1) {
    resolve();
    const wanted = wantedMode(equations, margin);
    if (wanted === equations.mode) return;
    equations.mode = wanted;
  }
}

/**
 * The first moment in (from, to] at which the loop has to change between free and held, found by halving on the step's
 * interpolation; null when it stays as it is. `resolveAt` solves the loop's equations at a time within the step.
 */
export function modeChange(
  equations: LoopEquations,
  from: number,
  to: number,
  margin: number,
  resolveAt: (x: number) => void,
): number | null {
  const stays = (x: number): boolean => {
    resolveAt(x);
    return wantedMode(equations, margin) === equations.mode;
  };
  let before = from;
  for (const fraction of NODE_FRACTIONS.slice(1)) {
    let after = fraction === 1 ? to : from + fraction * (to - from);
    if (!stays(after)) {
      while (after - before > 1e-15 * to) {
        const middle = (before + after) / 2;
        if (middle <= before || middle >= after) break;
        if (stays(middle)) before = middle;
        else after = middle;
      }
      return after;
    }
    before = after;
  }
  return null;
}
