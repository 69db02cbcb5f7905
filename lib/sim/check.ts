import { analyseLoop } from '../control/margins';
import type { Actuator, IdealController, Plant } from '../control/types';
import { simulateExact } from './exact';
import { automaticHorizon } from './horizon';
import type { EngineAgreement, LoadResponse, LoopCheck, SetpointResponse } from './types';

export interface Responses {
  readonly setpoint: SetpointResponse;
  readonly load: LoadResponse;
}

/**
 * A simulation engine as the check uses it: one response each to a unit step of set-point and load; null when the
 * loop is too much work for it.
 */
export type Engine = (
  plant: Plant,
  controller: IdealController,
  options: { horizonS: number; points?: number; actuator?: Actuator; sampleTimeS?: number },
) => Responses | null;

export interface CheckOptions {
  /** Output limits; with them the responses are those of the limited loop, the margins those of the linear one. */
  readonly actuator?: Actuator;
  /** A controller that runs once per this time, s. */
  readonly sampleTimeS?: number;
  /** Length of the responses, s; chosen so that both come to rest when not given. */
  readonly horizonS?: number;
  /** Points of the curves, ≥ 2. */
  readonly points?: number;
  /** A second, independent engine; the check says how far both agree. */
  readonly secondEngine?: Engine;
}

/** Two engines that differ by more than this share of the response have not checked each other. */
const AGREED = 1e-4;

const ONE_ENGINE =
  'The second engine could not follow this loop in reasonable time: this is not a check yet.';

function isLimited(actuator: Actuator | undefined): boolean {
  return (
    actuator !== undefined &&
    [actuator.low, actuator.high, actuator.slew].some((limit) => limit !== undefined)
  );
}

function largestDifference(a: Float64Array, b: Float64Array): { difference: number; peak: number } {
  let difference = 0;
  let peak = 0;
  // A point on a jump may fall on either side of it in the two engines: its neighbours tell the same.
  for (let i = 0; i < a.length; i += 1) {
    peak = Math.max(peak, Math.abs(a[i]));
    const here = Math.abs(a[i] - b[i]);
    const before = i > 0 ? Math.abs(a[i - 1] - b[i]) : here;
    const after = i < a.length - 1 ? Math.abs(a[i + 1] - b[i]) : here;
    difference = Math.max(difference, Math.min(here, Math.max(before, after)));
  }
  return { difference, peak };
}

/** Each dead time and each sample is at least one step: beyond this many nobody waits for the answer. */
const MOST_STEPS = 1_000_000;
const TOO_LONG =
  'The horizon is more than a million dead times or samples long: state a shorter horizon, or leave the dead time out.';

function tooLong(plant: Plant, horizonS: number, sampleTimeS: number | undefined): boolean {
  const shortest = Math.min(plant.deadTimeS > 0 ? plant.deadTimeS : Infinity, sampleTimeS ?? Infinity);
  return horizonS > MOST_STEPS * shortest;
}

/** Largest difference of y between two engines on the same grid, as a share of the peak; the worse of both responses. */
function agreementOf(a: Responses, b: Responses): number {
  const shares = [largestDifference(a.setpoint.y, b.setpoint.y), largestDifference(a.load.y, b.load.y)].map(
    ({ difference, peak }) => (peak > 0 ? difference / peak : 0),
  );
  return Math.max(...shares);
}

/** The linear loop by exact stepping, and by the second engine where there is one. */
function linearResponses(plant: Plant, controller: IdealController, horizonS: number, options: CheckOptions) {
  const { points, secondEngine } = options;
  const responses = simulateExact(plant, controller, { horizonS, points });
  if (!secondEngine) return { responses, engines: null, warnings: [] };
  const second = secondEngine(plant, controller, { horizonS, points });
  if (!second) return { responses, engines: null, warnings: [ONE_ENGINE] };
  const engines: EngineAgreement = { agreement: agreementOf(responses, second), engines: ['exact', 'ode'] };
  const warnings =
    engines.agreement > AGREED
      ? ['The two engines differ by more than 1/10000 of the response: this is not a check yet.']
      : [];
  return { responses, engines, warnings };
}

/**
 * Checks one loop: stability first, then margins with exact dead time, then both responses. Nothing is stated about
 * the responses of an unstable loop.
 *
 * @throws RangeError for a plant or controller outside its range, or for options outside theirs
 */
export function checkLoop(plant: Plant, controller: IdealController, options: CheckOptions = {}): LoopCheck {
  const { stable, margins } = analyseLoop(plant, controller);
  if (!stable) return { stable, margins, setpoint: null, load: null, engines: null, warnings: [] };
  const { horizonS, settled } = options.horizonS
    ? { horizonS: options.horizonS, settled: true }
    : automaticHorizon(plant, controller, margins);
  const slow = settled ? [] : ['The responses do not come to rest within 200 time constants of the loop.'];
  if (tooLong(plant, horizonS, options.sampleTimeS))
    return { stable, margins, setpoint: null, load: null, engines: null, warnings: [TOO_LONG] };
  const { actuator, sampleTimeS, points, secondEngine } = options;
  const nonlinear = isLimited(actuator) || sampleTimeS !== undefined;
  if (!nonlinear || !secondEngine) {
    const { responses, engines, warnings } = linearResponses(plant, controller, horizonS, options);
    const linear = nonlinear ? ['Limits and sampling are left out of this preview.'] : [];
    return { stable, margins, ...responses, engines, warnings: [...slow, ...warnings, ...linear] };
  }
  const responses = secondEngine(plant, controller, { horizonS, points, actuator, sampleTimeS });
  if (!responses) {
    const warnings = ['The limited or sampled loop could not be followed in reasonable time.'];
    return { stable, margins, setpoint: null, load: null, engines: null, warnings };
  }
  const alone = ['With limits or sampling the responses come from one engine alone.'];
  return { stable, margins, ...responses, engines: null, warnings: [...slow, ...alone] };
}
