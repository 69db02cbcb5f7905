import type { KeptCheck } from '../../../db/schema';
import type { Actuator, IdealController } from '../../control/types';
import { judgeLoadCases, type Requirement, type Verdict } from '../../requirement';
import type { LoadCaseInput } from '../../schemas/loop';
import { checkLoop, type Engine } from '../../sim/check';
import { trySimulateOde } from '../../sim/ode';
import type { LoopCheck } from '../../sim/types';

export interface LoadCaseChecks {
  readonly checks: readonly { readonly name: string; readonly check: LoopCheck }[];
  readonly worst: { readonly name: string; readonly index: number };
  readonly verdict: Verdict;
}

export interface CheckSettings {
  readonly actuator?: Actuator;
  readonly sampleTimeS?: number;
  readonly horizonS?: number;
  readonly points?: number;
}

/** The adaptive solver as second engine; null when it can't follow the loop in reasonable time. */
const secondEngine: Engine = (plant, controller, options) => {
  const solved = trySimulateOde(plant, controller, options);
  return solved.ok ? solved.value : null;
};

/** Every load case checked with both engines, and the verdict over all of them: the worst decides. */
export function checkLoadCases(
  cases: readonly LoadCaseInput[],
  controller: IdealController,
  requirement: Requirement,
  settings: CheckSettings,
): LoadCaseChecks {
  const checks = cases.map(({ name, plant }) => ({
    name,
    check: checkLoop(plant.plant, controller, { ...settings, secondEngine }),
  }));
  const { worst, verdict } = judgeLoadCases(requirement, checks);
  return { checks, worst, verdict };
}

const KEPT_POINTS = 160;

function thinned(values: Float64Array): number[] {
  const stride = Math.max(1, (values.length - 1) / (KEPT_POINTS - 1));
  const length = Math.min(values.length, KEPT_POINTS);
  return Array.from({ length }, (_, index) => Number(values[Math.round(index * stride)].toPrecision(7)));
}

/** The form in which a check is stored: every figure, and curves thin enough for a picture. */
export function keptCheck(name: string, check: LoopCheck): KeptCheck {
  const thin = <R extends { t: Float64Array; y: Float64Array; u: Float64Array }>(response: R | null) =>
    response && { ...response, t: thinned(response.t), y: thinned(response.y), u: thinned(response.u) };
  const { stable, margins, engines, warnings } = check;
  return { name, stable, margins, setpoint: thin(check.setpoint), load: thin(check.load), engines, warnings };
}
