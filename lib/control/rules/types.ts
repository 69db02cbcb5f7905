import type { PlantShape } from '../reduction/recognise';
import type { ControllerType } from '../types';
import type { NativeSettings } from './native';

/** What a rule can be asked for; 'I' is integral-only control, the published answer for plants without a main lag. */
export type TuningType = ControllerType | 'I';

/** Ultimate gain (signed as the plant's) and ultimate period in s: all that the ultimate-point rules know. */
interface UltimateModel {
  readonly shape: 'ultimate';
  readonly ku: number;
  readonly tu: number;
}

/** The model that a row of a rule is written for. */
export type RuleModel = Exclude<PlantShape, { shape: 'general' }> | UltimateModel;
export type ModelShape = RuleModel['shape'];
export type ModelOf<Shape extends ModelShape> = Extract<RuleModel, { shape: Shape }>;

/**
 * The range of a rule's own setting (a closed-loop time in s or a frequency in rad/s) for one model: `calm` is the
 * value at aggressiveness 0, `recommended` at 0.5, `sharp` at 1; sharp = null ends the dial at 0.5.
 */
export interface SettingRange {
  readonly recommended: number;
  readonly calm: number;
  readonly sharp: number | null;
  /** Why the dial ends at 0.5, when sharp is null. */
  readonly ending?: string;
  /** The least value that the source allows, and its words. */
  readonly least?: { readonly value: number; readonly words: string };
  /** Said when the recommendation is not the source's own. */
  readonly note?: string;
}

/**
 * One row of a rule's table: one model shape, one controller type, one variant.
 * `setting` is the value of the rule's setting, NaN for rules without one.
 */
export interface Row {
  readonly shape: ModelShape;
  readonly type: TuningType;
  readonly variant: string | null;
  /** A sentence when the row does not hold for this model, else null. */
  readonly objection: (model: RuleModel) => string | null;
  /** The range of the setting; a reason or null (no lag and no dead time) when the model gives it none. */
  readonly range: (model: RuleModel, dampingRatio: number) => SettingRange | string | null;
  /** The settings, or a sentence when the formula has no possible controller here. */
  readonly settings: (model: RuleModel, setting: number, dampingRatio: number) => NativeSettings | string;
  readonly warnings: (model: RuleModel, setting: number) => readonly string[];
}

export interface RuleVariant {
  readonly id: string;
  readonly name: string;
  /** Citation, where it differs from the rule's. */
  readonly source?: string;
}

export interface RuleSetting {
  readonly name: 'lambda' | 'tau_c' | 'crossover_time' | 'natural_frequency';
  readonly symbol: string;
  readonly unit: 's' | 'rad/s';
  /** The recommendation in words. */
  readonly recommended: string;
}

/** A published tuning rule as readers see it. */
export interface RuleFacts<Id extends string = string> {
  readonly id: Id;
  readonly name: string;
  readonly types: readonly TuningType[];
  /** What the settings are meant for. */
  readonly aim: string;
  /** The controller form that the source writes its settings for. */
  readonly form: 'ideal' | 'series' | 'parallel';
  /** Where the rule holds, one sentence. */
  readonly validity: string;
  /** Citation. */
  readonly source: string;
  /** Range of dead time over time constant that the rule was published for, if it has one. */
  readonly deadTimeRatio?: readonly [low: number, high: number];
  /** The rule's own setting of speed, or null. */
  readonly setting: RuleSetting | null;
  readonly variants: readonly RuleVariant[];
}

export interface RuleDefinition<Id extends string = string> extends RuleFacts<Id> {
  readonly rows: readonly Row[];
  /** The rule is exact algebra for its plants and not applied to a reduced model. */
  readonly exactOnly?: true;
}
