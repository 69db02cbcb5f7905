import type { IdealController, Plant } from '../../control/types';
import type { Trajectory } from '../metrics';
import { linearSetups, type RunSetup, type StepKind } from './linear-loop';
import { LinearRun } from './linear-run';

/** Both responses of a loop, each computed as far as it has been asked for. */
export interface ResponseSource {
  /** A trajectory that covers at least the time from 0 to timeS; it grows with the next call. */
  upTo(kind: StepKind, timeS: number): Trajectory;
}

/** The responses of a linear loop by exact stepping. */
export function linearResponses(plant: Plant, controller: IdealController): ResponseSource {
  const setups = linearSetups(plant, controller);
  const runs = { setpoint: new LinearRun(setups.setpoint), load: new LinearRun(setups.load) };
  return {
    upTo: (kind, timeS) => {
      const trajectory = runs[kind].extendTo(timeS);
      const smaller = rescaled(setups[kind], runs[kind]);
      if (!smaller) return trajectory;
      setups[kind] = smaller;
      runs[kind] = new LinearRun(smaller);
      return runs[kind].extendTo(timeS);
    },
  };
}

/** A response much smaller than expected is computed again with its own size as the measure of its errors. */
function rescaled(setup: RunSetup, { peakY, peakU }: LinearRun): RunSetup | null {
  const yFloor = peakY > 0 && peakY < setup.yFloor ? peakY : setup.yFloor;
  const uFloor = peakU > 0 && peakU < setup.uFloor ? peakU : setup.uFloor;
  return yFloor < setup.yFloor || uFloor < setup.uFloor ? { ...setup, yFloor, uFloor } : null;
}
