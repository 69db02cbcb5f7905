import type { RuleId } from '@/lib/control/rules';
import type { ControllerType, IdealController } from '@/lib/control/types';
import { REQUIREMENT_ITEMS, type Requirement } from '@/lib/requirement';
import { parseNumber } from '@/lib/units';
import type { ControllerTerms, GainChoice, PreviewRequest } from './preview';

export type RequirementKey = keyof Requirement;
export type HandField = 'kp' | 'ti' | 'td';
export type TermField = 'n' | 'b' | 'c' | 'tf';

/** What stands in the fields of the worksheet, as typed. */
export interface WorksheetState {
  cases: { name: string; text: string }[];
  shown: number;
  tuneOn: number;
  requirement: Partial<Record<RequirementKey, string>>;
  source: 'rule' | 'hand';
  rule: RuleId;
  variant?: string;
  type: ControllerType;
  aggressiveness: number;
  hand: Record<HandField, string>;
  terms: Record<TermField, string>;
  filterOrder: 1 | 2;
}

export type WorksheetAction =
  | { do: 'plant'; text: string }
  | { do: 'show-case'; index: number }
  | { do: 'tune-on'; index: number }
  | { do: 'add-case'; name: string }
  | { do: 'rename-case'; name: string }
  | { do: 'remove-case' }
  | { do: 'limit'; key: RequirementKey; text: string }
  | { do: 'rule'; rule: RuleId; types: readonly ControllerType[] }
  | { do: 'by-hand'; start: IdealController | null }
  | { do: 'variant'; variant?: string }
  | { do: 'type'; type: ControllerType }
  | { do: 'dial'; aggressiveness: number }
  | { do: 'hand'; field: HandField; text: string }
  | { do: 'term'; field: TermField; text: string }
  | { do: 'filter-order'; order: 1 | 2 };

/** Digits enough to type a computed gain back without a change that anyone could measure. */
export function asTyped(value: number): string {
  return Number.isFinite(value) ? String(Number(value.toPrecision(6))) : '';
}

function atShown(
  state: WorksheetState,
  change: (one: { name: string; text: string }) => { name: string; text: string },
) {
  return { ...state, cases: state.cases.map((one, index) => (index === state.shown ? change(one) : one)) };
}

export function worksheetReducer(state: WorksheetState, action: WorksheetAction): WorksheetState {
  switch (action.do) {
    case 'plant':
      return atShown(state, (one) => ({ ...one, text: action.text }));
    case 'rename-case':
      return atShown(state, (one) => ({ ...one, name: action.name }));
    case 'show-case':
      return { ...state, shown: action.index };
    case 'tune-on':
      return { ...state, tuneOn: action.index };
    case 'add-case':
      return {
        ...state,
        cases: [...state.cases, { name: action.name, text: state.cases[state.shown].text }],
        shown: state.cases.length,
      };
    case 'remove-case':
      return {
        ...state,
        cases: state.cases.filter((_, index) => index !== state.shown),
        shown: Math.max(0, state.shown - 1),
        tuneOn: state.tuneOn >= state.shown ? Math.max(0, state.tuneOn - 1) : state.tuneOn,
      };
    case 'limit':
      return { ...state, requirement: { ...state.requirement, [action.key]: action.text } };
    case 'rule': {
      const type = action.types.includes(state.type) ? state.type : action.types[action.types.length - 1];
      return { ...state, source: 'rule', rule: action.rule, variant: undefined, type };
    }
    case 'by-hand': {
      const start = action.start;
      const hand = start
        ? { kp: asTyped(start.kp), ti: asTyped(start.ti), td: start.td ? asTyped(start.td) : '' }
        : state.hand;
      return { ...state, source: 'hand', hand };
    }
    case 'variant':
      return { ...state, variant: action.variant };
    case 'type':
      return { ...state, type: action.type };
    case 'dial':
      return { ...state, aggressiveness: action.aggressiveness };
    case 'hand':
      return { ...state, hand: { ...state.hand, [action.field]: action.text } };
    case 'term':
      return { ...state, terms: { ...state.terms, [action.field]: action.text } };
    case 'filter-order':
      return { ...state, filterOrder: action.order };
  }
}

export interface ReadFields {
  requirement: Requirement;
  gains: GainChoice | null;
  terms: ControllerTerms;
  /** What is wrong, by field: `limit.msMax`, `hand.kp`, `term.n`. */
  errors: Readonly<Record<string, string>>;
}

interface Range {
  /** The value must be above this. */
  above?: number;
  least?: number;
  /** What an empty field stands for; without it, an empty field is an error. */
  empty?: number;
}

function read(text: string, range: Range): { value: number } | { error: string } {
  if (text.trim() === '' && range.empty !== undefined) return { value: range.empty };
  const parsed = parseNumber(text);
  if (!parsed.ok) return { error: text.trim() === '' ? 'A number is needed here.' : parsed.message };
  if (range.above !== undefined && !(parsed.value > range.above))
    return { error: `Must be above ${range.above}.` };
  if (range.least !== undefined && !(parsed.value >= range.least))
    return { error: `Must be ${range.least} or more.` };
  return parsed;
}

function readHand(
  state: WorksheetState,
  note: (key: string, text: string, range: Range) => number | null,
): GainChoice | null {
  const kp = note('hand.kp', state.hand.kp, {});
  const ti = note('hand.ti', state.hand.ti, { above: 0, empty: Infinity });
  const td = note('hand.td', state.hand.td, { least: 0, empty: 0 });
  return kp === null || ti === null || td === null ? null : { kind: 'hand', kp, ti, td };
}

/** Reads the typed fields; a field that can't be read is named and left out, the others still count. */
export function readFields(state: WorksheetState): ReadFields {
  const errors: Record<string, string> = {};
  const note = (key: string, text: string, range: Range): number | null => {
    const answer = read(text, range);
    if ('value' in answer) return answer.value;
    errors[key] = answer.error;
    return null;
  };
  const requirement: Record<string, number> = {};
  for (const { key } of REQUIREMENT_ITEMS) {
    const text = state.requirement[key] ?? '';
    if (text.trim() === '') continue;
    const value = note(`limit.${key}`, text, key === 'overshootMax' ? { least: 0 } : { above: 0 });
    if (value !== null) requirement[key] = value;
  }
  const n = note('term.n', state.terms.n, { above: 0, empty: 10 });
  const b = note('term.b', state.terms.b, { least: 0, empty: 1 });
  const c = note('term.c', state.terms.c, { least: 0, empty: 0 });
  const tf = note('term.tf', state.terms.tf, { least: 0, empty: 0 });
  const terms: ControllerTerms = {
    ...(n !== null && state.terms.n.trim() !== '' ? { n } : {}),
    ...(b !== null && state.terms.b.trim() !== '' ? { b } : {}),
    ...(c !== null && state.terms.c.trim() !== '' ? { c } : {}),
    ...(tf ? { filter: { timeConstantS: tf, order: state.filterOrder } } : {}),
  };
  const gains: GainChoice | null =
    state.source === 'hand'
      ? readHand(state, note)
      : {
          kind: 'rule',
          rule: state.rule,
          type: state.type,
          aggressiveness: state.aggressiveness,
          variant: state.variant,
        };
  return { requirement, gains, terms, errors };
}

export function previewRequest(
  state: WorksheetState,
  fields: ReadFields,
  inService: PreviewRequest['inService'],
): PreviewRequest | null {
  if (!fields.gains) return null;
  return {
    cases: state.cases,
    tuneOn: state.tuneOn,
    shown: state.shown,
    gains: fields.gains,
    terms: fields.terms,
    requirement: fields.requirement,
    inService,
  };
}
