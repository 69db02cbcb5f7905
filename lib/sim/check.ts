import { analyseLoop } from '../control/margins';
import type { Actuator, IdealController, Margins, Plant } from '../control/types';
import { agreementOf } from './agreement';
import { DEFAULT_POINTS, requireInRange, type Responses } from './exact';
import { responseFigures } from './exact/figures';
import { responsesOf } from './exact/responses';
import { automaticHorizon } from './horizon';
import { limitedFinals } from './limited-finals';
import type { LoopCheck } from './types';

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
  /** Points of the curves, ≥ 2; 600 when not given. */
  readonly points?: number;
  /** A second, independent engine; the check says how far both agree. */
  readonly secondEngine?: Engine;
}

/** Two engines that differ by more than this share of the response have not checked each other. */
const AGREED = 1e-4;

const NOT_AT_REST = 'The responses do not come to rest within the longest horizon that is searched.';
const SAMPLED_TOO_SLOWLY = 'With this sample time the response grows without bound: sample faster.';
const ONE_ENGINE =
  'The second engine could not follow this loop in reasonable time: this is not a check yet.';
const DIFFERENT = 'The two engines differ by more than 1/10000 of the response: this is not a check yet.';
const SLEW_LEFT_OUT = 'The limit on the rate of change is left out of this preview.';
const SLEW_ALONE = 'With a limit on the rate of change the responses come from one engine alone.';
const SLEW_FAILED = 'The loop with a limited rate of change could not be followed in reasonable time.';

/**
 * Checks one loop: stability first, then margins with exact dead time, then both responses. Nothing is stated about
 * the responses of an unstable loop.
 *
 * Definitions: margins as in lib/control/margins, responses as in lib/sim/exact; the horizon, where none is given, is
 * that of `automaticHorizon`. Margins belong to the linear, continuous loop also where limits or a sample time are given.
 *
 * @returns the check; responses are null, with a sentence that says why, where no engine could follow the loop
 * @throws RangeError for a plant or controller outside its range, or for options outside theirs
 */
export function checkLoop(plant: Plant, controller: IdealController, options: CheckOptions = {}): LoopCheck {
  const { stable, margins } = analyseLoop(plant, controller);
  if (!stable) return { stable, margins, setpoint: null, load: null, engines: null, warnings: [] };
  return { stable, margins, ...responsesChecked(plant, controller, margins, options) };
}

function responsesChecked(
  plant: Plant,
  controller: IdealController,
  margins: Margins,
  options: CheckOptions,
): Omit<LoopCheck, 'stable' | 'margins'> {
  const { actuator, sampleTimeS, points = DEFAULT_POINTS, secondEngine } = options;
  // A rate limit of a continuous controller is beyond the exact engine.
  const slewed = actuator?.slew !== undefined && sampleTimeS === undefined;
  const followed = slewed ? { ...actuator, slew: undefined } : actuator;
  requireInRange({ horizonS: options.horizonS ?? 1, points, actuator: followed, sampleTimeS });
  const source = responsesOf(plant, controller, { actuator: followed, sampleTimeS });
  const final = limitedFinals(plant, controller, actuator);
  const { horizonS, settled } = options.horizonS
    ? { horizonS: options.horizonS, settled: true }
    : automaticHorizon(plant, controller, margins, source, final);
  const warnings = settled ? [] : [NOT_AT_REST];
  const second = secondEngine?.(plant, controller, { horizonS, points, actuator, sampleTimeS }) ?? null;
  if (slewed && secondEngine) {
    if (!second) return { setpoint: null, load: null, engines: null, warnings: [SLEW_FAILED] };
    return { ...second, engines: null, warnings: [...warnings, SLEW_ALONE] };
  }
  const exact = responseFigures(source, final, horizonS, points);
  if (!exact.ok) {
    const sampledOut = exact.code === 'DIVERGED' && sampleTimeS !== undefined && !actuator;
    const why = sampledOut ? SAMPLED_TOO_SLOWLY : exact.message;
    return { setpoint: null, load: null, engines: null, warnings: [why] };
  }
  if (slewed) warnings.push(SLEW_LEFT_OUT);
  if (!secondEngine) return { ...exact.value, engines: null, warnings };
  if (!second) return { ...exact.value, engines: null, warnings: [...warnings, ONE_ENGINE] };
  const agreement = agreementOf(exact.value, second);
  if (!(agreement <= AGREED)) warnings.push(DIFFERENT);
  return { ...exact.value, engines: { agreement, engines: ['exact', 'ode'] }, warnings };
}
