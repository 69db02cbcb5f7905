import type { DelayedInput } from './history';
import { firstChange, wantedMode } from './limit-events';
import type { LimitMode, LoopEquations } from './loop-equations';
import type { Stepper } from './stepper';

/** Keeps the equations in the mode that the limits of value and rate ask for, from run to run. */
export class Limits {
  /** The output where the last run ended; nothing flows before t = 0. */
  private lastOutput = 0;

  constructor(
    private readonly equations: LoopEquations,
    private readonly stepper: Stepper,
    private readonly history: DelayedInput,
    private readonly margin: number,
  ) {
    const { low, high } = equations.excitation;
    this.lastOutput = Math.min(Math.max(0, low), high);
  }

  /** Before a run: at the start, after a jump and after a change. */
  settle(): void {
    const { equations, stepper } = this;
    const { x, state } = stepper;
    const { low, high } = equations.excitation;
    // A value that jumps away from the output can only be followed at the limited rate.
    const follow = (): void => {
      if (equations.ramp < 0) return;
      const gap = Math.min(Math.max(equations.v, low), high) - this.lastOutput;
      if (Math.abs(gap) <= 3 * this.margin * (1 + Math.abs(this.lastOutput))) return;
      this.startRamp(gap > 0 ? 'rising' : 'falling');
    };
    for (let attempt = 0; attempt < 4; attempt += 1) {
      equations.resolve(state, this.history.at(x));
      if (equations.mode !== 'rising' && equations.mode !== 'falling') follow();
      const wanted = this.wanted(x, state);
      if (wanted === equations.mode) return;
      if (wanted === 'rising' || wanted === 'falling') this.startRamp(wanted);
      else equations.mode = wanted;
    }
  }

  /** The first moment within a step at which the mode has to change, or null. */
  changeWithin(from: number, to: number, resolveAt: (x: number) => ArrayLike<number>): number | null {
    const { equations } = this;
    const change = firstChange(from, to, (x) => this.wanted(x, resolveAt(x)) === equations.mode);
    resolveAt(change ?? to);
    this.lastOutput = equations.output;
    return change;
  }

  private wanted(x: number, state: ArrayLike<number>): LimitMode {
    const { equations, history } = this;
    return wantedMode(equations, this.margin, () =>
      equations.outputRate(state, history.at(x), history.rateAt(x)),
    );
  }

  private startRamp(mode: 'rising' | 'falling'): void {
    this.stepper.state[this.equations.ramp] = this.lastOutput;
    this.equations.mode = mode;
    this.equations.resolve(this.stepper.state, this.history.at(this.stepper.x));
  }
}
