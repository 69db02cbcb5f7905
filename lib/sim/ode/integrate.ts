import { ok, refuse, type Result } from '../../result';
import { Breaks } from './breaks';
import { DelayedInput } from './history';
import { Limits } from './limits';
import type { LoopEquations } from './loop-equations';
import type { Solution } from './pieces';
import { Stepper } from './stepper';

export interface IntegrationSettings {
  /** End and dead time in the dimensionless time. */
  readonly end: number;
  readonly delay: number;
  readonly tolerance: number;
  /** How far a limit is overstepped before it takes hold or lets go, relative to its size. */
  readonly margin: number;
  readonly budget: number;
  /** By how many orders a jump of the controller output is smoothed on its way through plant and filter. */
  readonly smoothing: number;
}

export type IntegrationRefusal = 'ODE_TOO_COSTLY' | 'ODE_DIVERGED';

/**
 * Integrates the loop with a continuous controller from rest over [0, end] by the method of steps: no run of the
 * solver reaches across a moment at which a jump or kink arrives, and no step is longer than the dead time, so that
 * the delayed output is always known.
 */
export function integrateContinuous(
  equations: LoopEquations,
  settings: IntegrationSettings,
): Result<Solution, IntegrationRefusal> {
  const { end, delay, smoothing, margin } = settings;
  const stepper = new Stepper(equations, { ...settings, longestStep: delay });
  const history = new DelayedInput(stepper.solution, delay, equations.excitation.load);
  const breaks = new Breaks(delay, smoothing, end);
  const limits = equations.limited ? new Limits(equations, stepper, history, margin) : null;
  const inputAt = (x: number): number => history.at(x);
  const output = (): number => equations.output;
  const stopWithin = (from: number, to: number, resolveAt: (x: number) => ArrayLike<number>): number => {
    const change = limits?.changeWithin(from, to, resolveAt) ?? null;
    if (change !== null) breaks.arise(change, 1);
    return change ?? to;
  };

  breaks.arise(0, 0);
  while (stepper.x < end) {
    history.restrict(stepper.x, breaks.next());
    limits?.settle();
    stepper.advance({ end: breaks.next(), inputAt, output, ...(limits ? { stopWithin } : {}) });
    breaks.pass(stepper.x);
    const refusal = refusalOf(stepper, settings.budget);
    if (refusal) return refusal;
  }
  return ok(stepper.solution);
}

/** Why the stepper had to give up, or null. */
export function refusalOf(
  stepper: Stepper,
  budget: number,
): ReturnType<typeof refuse<IntegrationRefusal>> | null {
  if (stepper.diverged) {
    return refuse('ODE_DIVERGED', 'The response grows without bound; only stable loops can be simulated.');
  }
  if (stepper.overBudget) {
    return refuse(
      'ODE_TOO_COSTLY',
      'The dead time, a filter or a lag is so short against the horizon that the step-by-step solver would need more ' +
        `than ${budget} evaluations; a shorter horizon brings the loop within its reach.`,
    );
  }
  return null;
}
