import { amigo } from './amigo';
import { chrLoad0, chrLoad20, chrSetpoint0, chrSetpoint20 } from './chr';
import { cohenCoon } from './cohen-coon';
import { imc } from './imc';
import { lambda } from './lambda';
import { iaeLoad, iseLoad, itaeLoad } from './lopez';
import { magnitudeOptimum } from './magnitude-optimum';
import { polePlacement } from './pole-placement';
import { iaeSetpoint, itaeSetpoint } from './rovira';
import { simc } from './simc';
import { symmetricalOptimum } from './symmetrical-optimum';
import { tyreusLuyben } from './tyreus-luyben';
import type { RuleDefinition, RuleFacts } from './types';
import { znReaction } from './zn-reaction';
import { znUltimate } from './zn-ultimate';

/** Every rule, in the order that readers see. A new rule is a file of its own and one line here. */
const DEFINITIONS = [
  simc,
  lambda,
  imc,
  amigo,
  znReaction,
  znUltimate,
  tyreusLuyben,
  cohenCoon,
  chrSetpoint0,
  chrSetpoint20,
  chrLoad0,
  chrLoad20,
  itaeSetpoint,
  itaeLoad,
  iaeSetpoint,
  iaeLoad,
  iseLoad,
  magnitudeOptimum,
  symmetricalOptimum,
  polePlacement,
] as const;

export type RuleId = (typeof DEFINITIONS)[number]['id'];
export type Rule = RuleFacts<RuleId>;

/** The published tuning rules with what a reader needs to choose one. */
export const RULES: readonly Rule[] = DEFINITIONS.map(factsOf);

/** The rule of an id, with its rows; null when there is none. */
export function findRule(id: string): RuleDefinition<RuleId> | null {
  return DEFINITIONS.find((rule) => rule.id === id) ?? null;
}

function factsOf({ rows: _rows, exactOnly: _exactOnly, ...facts }: RuleDefinition<RuleId>): Rule {
  return facts;
}
