import type { Actuator, IdealController, Plant } from '../../control/types';
import { ok, refuse, type Result } from '../../result';
import type { Trajectory } from '../metrics';
import { continuousLoop } from './continuous-loop';
import { ContinuousRun } from './continuous-run';
import type { Floors } from './loop-scales';
import { SampledRun } from './sampled-run';
import type { StepKind } from './spaces';
import { MOST_PIECES, type Refusal, type Stepper } from './stepper';

/** Both responses of a loop, each computed as far as it has been asked for. */
export interface ResponseSource {
  /** A trajectory that covers at least the time from 0 to timeS; it grows with the next call. */
  upTo(kind: StepKind, timeS: number, mostPieces?: number): Result<Trajectory, Refusal>;
  /** How far a response has been followed, s. */
  reachedS(kind: StepKind): number;
}

/** A response that can be extended; with the sizes it came to. */
interface Run {
  readonly stepper: Stepper;
  /** Goes on until the trajectory covers the time. */
  extendTo(timeS: number): void;
}

/** The responses of a loop as its controller runs: continuous or sampled, with or without output limits. */
export function responsesOf(
  plant: Plant,
  controller: IdealController,
  { actuator = {}, sampleTimeS }: { actuator?: Actuator; sampleTimeS?: number } = {},
): ResponseSource {
  if (sampleTimeS !== undefined)
    return source(
      (kind, floors) => new SampledRun(plant, controller, { kind, sampleTimeS, actuator, floors }),
    );
  const loop = continuousLoop(plant, controller, actuator);
  return source((kind, floors) => new ContinuousRun(loop, kind, floors));
}

const MESSAGES: Readonly<Record<Refusal, string>> = {
  DIVERGED: 'The response grows without bound.',
  TOO_LONG: 'The response takes more than a million steps: state a shorter horizon.',
};

function answer({ stepper }: Run): Result<Trajectory, Refusal> {
  const { refusal, trajectory } = stepper;
  return refusal ? refuse(refusal, MESSAGES[refusal]) : ok(trajectory);
}

/** A response much smaller than expected is computed again with its own size as the measure of its errors. */
function source(start: (kind: StepKind, floors?: Floors) => Run): ResponseSource {
  const runs: Partial<Record<StepKind, Run>> = {};
  return {
    reachedS: (kind) => runs[kind]?.stepper.timeS ?? 0,
    upTo: (kind, timeS, mostPieces = MOST_PIECES) => {
      const run = (runs[kind] ??= start(kind));
      run.stepper.mostPieces = mostPieces;
      run.extendTo(timeS);
      const { peakY, peakV, settings } = run.stepper;
      const yFloor = peakY > 0 ? Math.min(peakY, settings.yFloor) : settings.yFloor;
      const vFloor = peakV > 0 ? Math.min(peakV, settings.vFloor) : settings.vFloor;
      if (yFloor === settings.yFloor && vFloor === settings.vFloor) return answer(run);
      const again = (runs[kind] = start(kind, { yFloor, vFloor }));
      again.stepper.mostPieces = mostPieces;
      again.extendTo(timeS);
      return answer(again);
    },
  };
}
