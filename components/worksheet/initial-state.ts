import { RULES } from '@/lib/control/rules';
import type { ControllerType } from '@/lib/control/types';
import { REQUIREMENT_ITEMS } from '@/lib/requirement';
import { asTyped, type WorksheetState } from './state';
import type { WorksheetAxis } from './types';

const TYPES: readonly ControllerType[] = ['P', 'PI', 'PD', 'PID'];

type Source = Pick<WorksheetState, 'source' | 'rule' | 'type' | 'aggressiveness' | 'variant' | 'hand'>;

const FRESH: Source = {
  source: 'rule',
  rule: 'simc',
  type: 'PI',
  aggressiveness: 0.5,
  hand: { kp: '', ti: '', td: '' },
};

/** Where the gains of the last version came from: its rule and dial, or typed by hand. */
function sourceOf({ lastKept, lastSettings }: WorksheetAxis): Source {
  if (!lastKept || !lastSettings) return FRESH;
  const { kp, ti, td } = lastKept.controller;
  const hand = { kp: asTyped(kp), ti: asTyped(ti), td: td > 0 ? asTyped(td) : '' };
  const rule = RULES.find(({ id }) => id === lastSettings.rule);
  if (!rule) return { ...FRESH, source: 'hand', hand };
  const { type, aggressiveness, variant } = lastSettings.settings ?? {};
  return {
    source: 'rule',
    rule: rule.id,
    type: TYPES.find((one) => one === type) ?? 'PI',
    aggressiveness: typeof aggressiveness === 'number' ? aggressiveness : 0.5,
    variant: typeof variant === 'string' ? variant : undefined,
    hand,
  };
}

/** The fields as they stand when the page opens: the axis' own plants and limits, and the last version's gains. */
export function initialState(axis: WorksheetAxis): WorksheetState {
  const requirement: WorksheetState['requirement'] = {};
  for (const { key } of REQUIREMENT_ITEMS) {
    const value = axis.requirement[key];
    if (value !== undefined) requirement[key] = String(value);
  }
  const cases = axis.loadCases.map(({ name, text }) => ({ name, text }));
  return {
    cases: cases.length > 0 ? cases : [{ name: 'nominal', text: '' }],
    shown: 0,
    tuneOn: 0,
    requirement,
    ...sourceOf(axis),
    terms: { n: '', b: '', c: '', tf: '' },
    filterOrder: 1,
  };
}
