import { describe, expect, it } from 'vitest';
import {
  CHANGE_ACTIONS,
  CHANGE_STATES,
  permittedActions,
  permittedStep,
  ROLES,
  signatureMeaning,
  type ChangeAction,
  type ChangeState,
  type Role,
} from '../../lib/change';

/**
 * The rules written out apart from the code, one line each: who · action · from > to.
 * "own": only the author; "other": not the author, unless the organisation is a one-person shop.
 */
const RULES = `
  engineer own                edit       draft>draft returned>returned
  engineer own                submit     draft>submitted returned>submitted
  approver other              approve    submitted>approved
  approver other              return     submitted>returned
  engineer own                withdraw   draft>withdrawn submitted>withdrawn returned>withdrawn approved>withdrawn
  engineer|approver any       issue      approved>issued
  technician any              apply      issued>applied
  engineer|technician any     verify     applied>verified
  technician any              roll-back  issued>rolled-back applied>rolled-back verified>rolled-back
`;

interface Rule {
  roles: string[];
  whose: string;
  moves: Map<string, string>;
}

const rules = new Map<string, Rule>(
  RULES.trim()
    .split('\n')
    .map((line) => {
      const [roles, whose, action, ...moves] = line.trim().split(/\s+/);
      return [
        action,
        {
          roles: roles.split('|'),
          whose,
          moves: new Map(moves.map((move) => move.split('>') as [string, string])),
        },
      ];
    }),
);

function expected(
  state: ChangeState,
  action: ChangeAction,
  roles: readonly Role[],
  isAuthor: boolean,
  alone: boolean,
): string {
  const rule = rules.get(action);
  if (!rule) throw new Error(action);
  if (!rule.roles.some((role) => roles.some((own) => own === role))) return 'WRONG_ROLE';
  if (rule.whose === 'own' && !isAuthor) return 'WRONG_ROLE';
  const to = rule.moves.get(state);
  if (to === undefined) return 'WRONG_STATE';
  return rule.whose === 'other' && isAuthor && !alone ? 'FOUR_EYES' : to;
}

const roleSets: Role[][] = Array.from({ length: 2 ** ROLES.length }, (_, bits) =>
  ROLES.filter((_role, at) => bits & (1 << at)),
);

describe('permittedStep', () => {
  it('answers every state, action, set of roles, authorship and kind of shop as the table says', () => {
    let asked = 0;
    for (const state of CHANGE_STATES) {
      for (const action of CHANGE_ACTIONS) {
        for (const roles of roleSets) {
          for (const isAuthor of [true, false]) {
            for (const onePersonShop of [true, false]) {
              const answer = permittedStep({ state, action, roles, isAuthor, onePersonShop });
              const said = answer.ok ? answer.value.to : answer.code;
              expect(said, `${state} ${action} ${roles.join('+')} ${isAuthor} ${onePersonShop}`).toBe(
                expected(state, action, roles, isAuthor, onePersonShop),
              );
              if (!answer.ok) expect(answer.message).toMatch(/^[A-Z].*\.$/);
              asked += 1;
            }
          }
        }
      }
    }
    expect(asked).toBe(9 * 9 * 16 * 4);
  });

  it('walks the whole way from draft to verified with three people', () => {
    const way: [ChangeAction, Role, boolean][] = [
      ['submit', 'engineer', true],
      ['approve', 'approver', false],
      ['issue', 'engineer', true],
      ['apply', 'technician', false],
      ['verify', 'technician', false],
    ];
    let state: ChangeState = 'draft';
    for (const [action, role, isAuthor] of way) {
      const answer = permittedStep({ state, action, roles: [role], isAuthor, onePersonShop: false });
      if (!answer.ok) throw new Error(answer.message);
      state = answer.value.to;
    }
    expect(state).toBe('verified');
  });

  it('keeps a change applied when its test fails and asks for the roll-back', () => {
    const answer = permittedStep({
      state: 'applied',
      action: 'verify',
      roles: ['technician'],
      isAuthor: false,
      onePersonShop: false,
      result: 'fail',
    });
    expect(answer).toMatchObject({ ok: true, value: { to: 'applied' } });
    expect(answer.ok && answer.value.advice).toContain('roll it back');
  });

  it('says what stands in the way in plain words', () => {
    const ask = (state: ChangeState, action: ChangeAction, roles: Role[], isAuthor = false) => {
      const answer = permittedStep({ state, action, roles, isAuthor, onePersonShop: false });
      return answer.ok ? '' : answer.message;
    };
    expect(ask('approved', 'approve', ['approver'])).toBe(
      'This change is already approved; it can be approved only while it is submitted.',
    );
    expect(ask('submitted', 'approve', ['engineer'])).toBe(
      'A change is approved by an approver; you are an engineer.',
    );
    expect(ask('submitted', 'approve', ['approver'], true)).toContain('four eyes');
    expect(ask('issued', 'apply', [])).toBe(
      'A change is applied by a technician; you are without a role here.',
    );
    expect(ask('approved', 'submit', ['engineer'], true)).toBe(
      'This change is already approved; it can be submitted only while it is a draft or returned.',
    );
  });

  it('lists what a person may do now', () => {
    const question = { state: 'submitted', roles: ['engineer', 'approver'], onePersonShop: false } as const;
    expect(permittedActions({ ...question, isAuthor: false })).toEqual(['approve', 'return']);
    expect(permittedActions({ ...question, isAuthor: true })).toEqual(['withdraw']);
    expect(permittedActions({ ...question, isAuthor: true, onePersonShop: true })).toEqual([
      'approve',
      'return',
      'withdraw',
    ]);
  });

  it('gives every signed step its own meaning in the first person', () => {
    const meanings = CHANGE_ACTIONS.filter((action) => action !== 'edit').map(signatureMeaning);
    expect(new Set(meanings).size).toBe(8);
    for (const meaning of meanings) expect(meaning).toMatch(/^I .+\.$/);
    expect(signatureMeaning('edit')).toBeNull();
  });
});
