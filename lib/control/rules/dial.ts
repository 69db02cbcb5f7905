import { ok, refuse, type Result } from '../../result';
import { formatQuantity, formatTimeS } from '../../units';
import { CALM_FACTOR, positionOf, settingAt } from './setting-range';
import type { RuleDefinition, RuleSetting, SettingRange } from './types';

/** What the aggressiveness dial stands for, so that a page can show the physical value. */
export interface Dial {
  /** Position 0 (calm) to 1 (sharp); null when a given setting lies outside the dial. */
  readonly aggressiveness: number | null;
  /** 'none': the model gives the dial no range, only a given setting counts. */
  readonly kind: 'closed-loop-time' | 'detuning' | 'none';
  readonly symbol: string;
  readonly value: number;
  /** 's', 'rad/s' or '' for the detuning factor. */
  readonly unit: string;
  /** The values at position 0 and at `maximum`. */
  readonly calm: number;
  readonly sharp: number;
  /** Last position offered: 1, or 0.5 with the reason. */
  readonly maximum: number;
  readonly reason?: string;
}

export interface ChosenSetting {
  /** The value of the rule's setting; NaN for a rule without one. */
  readonly setting: number;
  /** Every gain is divided by this. */
  readonly detuning: number;
  readonly dial: Dial;
  readonly warnings: readonly string[];
}

export type DialCode = 'SETTING_NEEDED' | 'AGGRESSIVENESS_NOT_OFFERED';

const MIDDLE = 0.5;
const NO_SHARPER =
  'The rule has no setting of speed: the middle of the dial is the rule as published, and the source names nothing faster.';

/**
 * The setting of a rule that has one: given, or from the dial, or as the source recommends.
 *
 * @param range the range for the model at hand; a reason or null when the model gives none
 * @param given the setting itself, overrides the dial
 * @param aggressiveness 0 to 1
 */
export function chooseSetting(
  setting: RuleSetting,
  range: SettingRange | string | null,
  given: number | undefined,
  aggressiveness: number | undefined,
): Result<ChosenSetting, DialCode> {
  if (range === null || typeof range === 'string') {
    const reason = range ?? `The model has neither a lag nor a dead time to derive ${setting.symbol} from`;
    if (given !== undefined) return ok(withoutRange(setting, given, reason));
    return refuse('SETTING_NEEDED', `${reason}: give ${setting.symbol} in ${setting.unit}.`);
  }
  const maximum = range.sharp === null ? MIDDLE : 1;
  const position = aggressiveness ?? MIDDLE;
  if (given === undefined && position > maximum) {
    return refuse('AGGRESSIVENESS_NOT_OFFERED', notOffered(range.ending ?? NO_SHARPER));
  }
  const value = given ?? settingAt(range, position);
  return ok({
    setting: value,
    detuning: 1,
    dial: {
      aggressiveness: given === undefined ? position : positionOf(range, given),
      kind: 'closed-loop-time',
      symbol: setting.symbol,
      value,
      unit: setting.unit,
      calm: range.calm,
      sharp: range.sharp ?? range.recommended,
      maximum,
      ...(range.sharp === null ? { reason: range.ending ?? NO_SHARPER } : {}),
    },
    warnings: [
      ...belowLeast(setting, range, value),
      ...(given === undefined && range.note !== undefined ? [range.note] : []),
    ],
  });
}

/** The dial of a rule without a setting: below the middle it divides the gain by up to 4, above it is not offered. */
export function chooseDetuning(aggressiveness: number | undefined): Result<ChosenSetting, DialCode> {
  const position = aggressiveness ?? MIDDLE;
  if (position > MIDDLE) return refuse('AGGRESSIVENESS_NOT_OFFERED', notOffered(NO_SHARPER));
  const detuning = CALM_FACTOR ** (1 - 2 * position);
  return ok({
    setting: NaN,
    detuning,
    dial: {
      aggressiveness: position,
      kind: 'detuning',
      symbol: 'gain divided by',
      value: detuning,
      unit: '',
      calm: CALM_FACTOR,
      sharp: 1,
      maximum: MIDDLE,
      reason: NO_SHARPER,
    },
    warnings: [],
  });
}

/** Last position of the dial that a rule offers whatever the model; for pages that show the dial before a plant is known. */
export function dialMaximum(rule: Pick<RuleDefinition, 'setting'>): number {
  return rule.setting === null || rule.setting.name === 'crossover_time' ? MIDDLE : 1;
}

function withoutRange({ symbol, unit }: RuleSetting, given: number, reason: string): ChosenSetting {
  return {
    setting: given,
    detuning: 1,
    dial: {
      aggressiveness: null,
      kind: 'none',
      symbol,
      value: given,
      unit,
      calm: given,
      sharp: given,
      maximum: MIDDLE,
      reason: `${reason}.`,
    },
    warnings: [],
  };
}

function belowLeast({ symbol, unit }: RuleSetting, { least }: SettingRange, value: number): string[] {
  if (least === undefined || value >= least.value * (1 - 1e-9)) return [];
  return [
    `${symbol} = ${written(value, unit)} is below ${written(least.value, unit)}, the least that the source allows (${least.words}).`,
  ];
}

function written(value: number, unit: string): string {
  return unit === 's' ? formatTimeS(value) : formatQuantity(value, unit);
}

function notOffered(reason: string): string {
  return `Aggressiveness above 0.5 is not offered here. ${reason}`;
}
