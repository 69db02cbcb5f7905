import { REQUIREMENT_ITEMS } from '@/lib/requirement';
import type { WorksheetState } from './state';
import type { WorksheetAxis } from './types';

/** The fields as they stand when the page opens: the axis' own plants and limits, and the gentlest common rule. */
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
    source: 'rule',
    rule: 'simc',
    type: 'PI',
    aggressiveness: 0.5,
    hand: { kp: '', ti: '', td: '' },
    terms: { n: '', b: '', c: '', tf: '' },
    filterOrder: 1,
  };
}
