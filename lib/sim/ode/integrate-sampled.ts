import { ok, type Result } from '../../result';
import { refusalOf, type IntegrationRefusal } from './integrate';
import type { LoopEquations } from './loop-equations';
import type { Solution } from './pieces';
import type { SampledLaw } from './sampled-law';
import { Stepper } from './stepper';

export interface SampledSettings {
  /** End, dead time and sample time in the dimensionless time. */
  readonly end: number;
  readonly delay: number;
  readonly sampleTime: number;
  readonly tolerance: number;
  readonly budget: number;
}

/**
 * Integrates plant and measurement filter under a sampled controller with zero-order hold. Plant and filter stay
 * continuous; the runs of the solver end at the samples and where a held value arrives after the dead time, which need
 * not be a multiple of the sample time. `equations` are those of plant and filter alone.
 */
export function integrateSampled(
  equations: LoopEquations,
  law: SampledLaw,
  settings: SampledSettings,
): Result<Solution, IntegrationRefusal> {
  const { end, delay, sampleTime } = settings;
  const stepper = new Stepper(equations, { ...settings, longestStep: 0 });
  const held: number[] = [];
  const margin = 1e-9 * Math.min(sampleTime, delay || sampleTime);
  let arrived = 0;
  // Without dead time the load is there at the first sample already; an output only after its sample.
  let input = delay === 0 ? equations.excitation.load : 0;
  const inputAt = (): number => input;
  const output = (): number => held[held.length - 1];

  while (stepper.x < end - margin) {
    const { x } = stepper;
    if (x >= held.length * sampleTime - margin) {
      equations.resolve(stepper.state, input);
      held.push(law.next(equations.measured));
    }
    while (arrived < held.length && x >= arrived * sampleTime + delay - margin) {
      input = held[arrived] + equations.excitation.load;
      arrived += 1;
    }
    const run = {
      end: Math.min(held.length * sampleTime, arrived * sampleTime + delay, end),
      inputAt,
      output,
    };
    stepper.advance(run);
    const refusal = refusalOf(stepper, settings.budget);
    if (refusal) return refusal;
  }
  return ok(stepper.solution);
}
