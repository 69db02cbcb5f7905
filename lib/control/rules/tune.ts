import { ok, refuse, type Result } from '../../result';
import { formatNumber } from '../../units';
import type { IdealController, Plant } from '../types';
import { chooseDetuning, chooseSetting, type ChosenSetting, type Dial, type DialCode } from './dial';
import { detuned, toIdeal, type NativeSettings } from './native';
import { pickRow, type PickCode, type PickedRow, type UsedModel } from './pick-row';
import { findRule, type RuleId } from './registry';
import {
  aboutDetuning,
  aboutLoop,
  aboutModel,
  INTEGRAL_ONLY,
  outsideRange,
  unusedSettings,
} from './tuning-warnings';
import type { RuleDefinition, TuningType } from './types';

export interface TuneRequest {
  readonly plant?: Plant;
  /** Ultimate gain, signed as the plant's, and ultimate period in s, > 0. */
  readonly ultimate?: { readonly ku: number; readonly tu: number };
  readonly rule: RuleId;
  readonly type: TuningType;
  /** 0 (calm) to 1 (sharp), 0.5 = as published. */
  readonly aggressiveness?: number;
  /** Closed-loop time of lambda, IMC, SIMC and a·Tσ of the symmetrical optimum in s, > 0; overrides the dial. */
  readonly lambdaS?: number;
  readonly variant?: string;
  /** Pole placement: damping ratio, > 0, default 0.7. */
  readonly dampingRatio?: number;
  /** Pole placement: natural frequency in rad/s, > 0; overrides the dial. */
  readonly naturalFrequency?: number;
}

export interface Tuning {
  /** The settings in the ideal form. */
  readonly controller: IdealController;
  /** The settings in the form of the source. */
  readonly native: NativeSettings;
  readonly rule: RuleId;
  readonly source: string;
  readonly variant?: string;
  readonly usedModel: UsedModel;
  readonly dial: Dial;
  readonly warnings: readonly string[];
}

export type TuneCode =
  'UNKNOWN_RULE' | 'TYPE_NOT_OFFERED' | 'UNKNOWN_VARIANT' | 'NO_POSSIBLE_CONTROLLER' | PickCode | DialCode;

/** Common practice: about 5 % overshoot of a second-order loop. */
const DEFAULT_DAMPING_RATIO = 0.7;

/**
 * Settings of a published tuning rule for a plant or an ultimate point.
 *
 * The exact shape of the plant decides the row of the rule; where the rule has none for it, the plant is reduced and
 * `usedModel` says how. Without `lambdaS`, `naturalFrequency` and `aggressiveness` the rule is as published.
 *
 * @param request see `TuneRequest`; a plant for rules on a model, a plant or an ultimate point for the others
 * @returns the settings with their source, the model used, the dial and warnings (outside the published range, a
 *   setting below the source's limit, ...); or a code with a sentence when the rule does not serve the request.
 *   Integral-only settings are `native` alone: the ideal form cannot carry them and is 0.
 * @throws RangeError for numbers outside their stated range
 */
export function tune(request: TuneRequest): Result<Tuning, TuneCode> {
  checkNumbers(request);
  const rule = findRule(request.rule);
  if (rule === null) return refuse('UNKNOWN_RULE', `There is no rule “${String(request.rule)}”.`);
  const offered = checkOffer(rule, request);
  if (!offered.ok) return offered;
  const picked = pickRow(
    rule,
    rule.setting?.name === 'tau_c' ? { ...request, tauCS: request.lambdaS } : request,
  );
  if (!picked.ok) return picked;
  const zeta = request.dampingRatio ?? DEFAULT_DAMPING_RATIO;
  const chosen = choose(rule, picked.value, request, zeta);
  if (!chosen.ok) return chosen;
  return settle(rule, request, picked.value, chosen.value, zeta);
}

function checkNumbers(request: TuneRequest): void {
  const { aggressiveness, lambdaS, dampingRatio, naturalFrequency, ultimate } = request;
  if (aggressiveness !== undefined && !(aggressiveness >= 0 && aggressiveness <= 1)) {
    throw new RangeError(`aggressiveness must lie in 0 to 1, not ${aggressiveness}`);
  }
  const positive = { lambdaS, dampingRatio, naturalFrequency, 'ultimate period tu': ultimate?.tu };
  for (const [name, value] of Object.entries(positive)) {
    if (value !== undefined && !(value > 0 && value < Infinity)) {
      throw new RangeError(`${name} must be a number above 0, not ${value}`);
    }
  }
  if (ultimate !== undefined && !(Number.isFinite(ultimate.ku) && ultimate.ku !== 0)) {
    throw new RangeError(`ultimate gain ku must be a number other than 0, not ${ultimate.ku}`);
  }
}

function checkOffer(
  rule: RuleDefinition<RuleId>,
  { type, variant }: TuneRequest,
): Result<null, 'TYPE_NOT_OFFERED' | 'UNKNOWN_VARIANT'> {
  if (!rule.types.includes(type)) {
    return refuse(
      'TYPE_NOT_OFFERED',
      `${rule.name} gives ${rule.types.join(', ')} settings, none for ${type}.`,
    );
  }
  if (variant === undefined) return ok(null);
  const known = rule.variants.map(({ id }) => id);
  if (!known.includes(variant)) {
    const offer = known.length === 0 ? 'has no variants' : `has the variants ${known.join(', ')}`;
    return refuse('UNKNOWN_VARIANT', `${rule.name} ${offer}; “${variant}” is none of them.`);
  }
  const types = rule.rows.filter((row) => row.variant === variant).map((row) => row.type);
  if (types.includes(type)) return ok(null);
  return refuse(
    'TYPE_NOT_OFFERED',
    `The variant “${variant}” of ${rule.name} gives ${[...new Set(types)].join(', ')} settings, none for ${type}.`,
  );
}

function choose(
  rule: RuleDefinition<RuleId>,
  { row, model }: PickedRow,
  request: TuneRequest,
  zeta: number,
): Result<ChosenSetting, DialCode> {
  if (rule.setting === null) return chooseDetuning(request.aggressiveness);
  const given = rule.setting.unit === 's' ? request.lambdaS : request.naturalFrequency;
  return chooseSetting(rule.setting, row.range(model, zeta), given, request.aggressiveness);
}

function settle(
  rule: RuleDefinition<RuleId>,
  request: TuneRequest,
  { row, model, used }: PickedRow,
  { setting, detuning, dial, warnings }: ChosenSetting,
  zeta: number,
): Result<Tuning, TuneCode> {
  const published = row.settings(model, setting, zeta);
  if (typeof published === 'string') return refuse('NO_POSSIBLE_CONTROLLER', published);
  const native = detuned(published, detuning);
  const controller = toIdeal(native);
  if (!isPossible(controller)) {
    return refuse(
      'NO_POSSIBLE_CONTROLLER',
      `The formula gives an impossible controller here (integral time ${formatNumber(controller.ti)} s, derivative time ${formatNumber(controller.td)} s): the plant lies outside the range of the rule. ${rule.validity}`,
    );
  }
  const variant = rule.variants.find(({ id }) => id === request.variant);
  return ok({
    controller,
    native,
    rule: rule.id,
    source: variant?.source ?? rule.source,
    ...(variant === undefined ? {} : { variant: variant.id }),
    usedModel: used,
    dial,
    warnings: [
      ...aboutLoop(request.plant, controller),
      ...warnings,
      ...aboutModel(used),
      ...outsideRange(rule, used),
      ...row.warnings(model, setting),
      ...aboutDetuning(used, controller, detuning),
      ...(native.form === 'integral' ? [INTEGRAL_ONLY] : []),
      ...unusedSettings(rule, request),
    ],
  });
}

function isPossible({ kp, ti, td }: IdealController): boolean {
  return Number.isFinite(kp) && ti > 0 && td >= 0 && td < Infinity;
}
