import type { Actuator, IdealController, Plant } from '../../control/types';
import type { Trajectory } from '../metrics';
import { continuousLoop } from './continuous-loop';
import { ContinuousRun } from './continuous-run';
import type { StepKind } from './spaces';
import type { StepperSettings } from './stepper';

/** Both responses of a loop, each computed as far as it has been asked for. */
export interface ResponseSource {
  /** A trajectory that covers at least the time from 0 to timeS; it grows with the next call. */
  upTo(kind: StepKind, timeS: number): Trajectory;
}

/** The responses of a loop as its controller runs: continuous or sampled, with or without output limits. */
export function responsesOf(
  plant: Plant,
  controller: IdealController,
  { actuator = {} }: { actuator?: Actuator; sampleTimeS?: number },
): ResponseSource {
  return continuousResponses(plant, controller, actuator);
}

/** The responses of a loop with a continuous controller, with or without output limits. */
export function continuousResponses(
  plant: Plant,
  controller: IdealController,
  actuator: Actuator = {},
): ResponseSource {
  const loop = continuousLoop(plant, controller, actuator);
  const start = (kind: StepKind, settings: StepperSettings) => new ContinuousRun(loop, kind, settings);
  const runs: Partial<Record<StepKind, ContinuousRun>> = {};
  return {
    upTo: (kind, timeS) => {
      const run = (runs[kind] ??= start(kind, loop.settings[kind]));
      const trajectory = run.extendTo(timeS);
      const smaller = rescaled(run);
      if (!smaller) return trajectory;
      runs[kind] = start(kind, smaller);
      return runs[kind].extendTo(timeS);
    },
  };
}

/** A response much smaller than expected is computed again with its own size as the measure of its errors. */
function rescaled({ stepper }: ContinuousRun): StepperSettings | null {
  const { peakY, peakV, settings } = stepper;
  const yFloor = peakY > 0 && peakY < settings.yFloor ? peakY : settings.yFloor;
  const vFloor = peakV > 0 && peakV < settings.vFloor ? peakV : settings.vFloor;
  return yFloor < settings.yFloor || vFloor < settings.vFloor ? { ...settings, yFloor, vFloor } : null;
}
