export { dialMaximum, type Dial } from './dial';
export type { NativeSettings } from './native';
export type { UsedModel } from './pick-row';
export { RULES, type Rule, type RuleId } from './registry';
export { tune, type TuneCode, type TuneRequest, type Tuning } from './tune';
export type { RuleSetting, RuleVariant, TuningType } from './types';
