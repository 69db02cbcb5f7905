import type { ChangeAction, ChangeState, Role } from './types';

/** One row of the table of permitted steps. */
export interface ChangeStep {
  /** From each state in which the action is possible, the state that it leads to. */
  readonly moves: Readonly<Partial<Record<ChangeState, ChangeState>>>;
  /** Any one of these roles is enough. */
  readonly roles: readonly Role[];
  /** 'required': only the author; 'barred': not the author (four eyes), except in a one-person shop. */
  readonly author?: 'required' | 'barred';
  /** 'It can be … ' in a refusal. */
  readonly verb: string;
  /** What the signature under this step means, in words; none where nothing is signed. */
  readonly meaning?: string;
}

/** Every step of a change; what is not here is not permitted. */
export const CHANGE_STEPS: Readonly<Record<ChangeAction, ChangeStep>> = {
  edit: {
    moves: { draft: 'draft', returned: 'returned' },
    roles: ['engineer'],
    author: 'required',
    verb: 'edited',
  },
  submit: {
    moves: { draft: 'submitted', returned: 'submitted' },
    roles: ['engineer'],
    author: 'required',
    verb: 'submitted',
    meaning: 'I have prepared this change, checked its values and ask for its approval.',
  },
  approve: {
    moves: { submitted: 'approved' },
    roles: ['approver'],
    author: 'barred',
    verb: 'approved',
    meaning: 'I have reviewed this change and approve that these values are entered.',
  },
  return: {
    moves: { submitted: 'returned' },
    roles: ['approver'],
    author: 'barred',
    verb: 'returned',
    meaning: 'I have reviewed this change and return it to its author for the reason given.',
  },
  withdraw: {
    moves: { draft: 'withdrawn', submitted: 'withdrawn', returned: 'withdrawn', approved: 'withdrawn' },
    roles: ['engineer'],
    author: 'required',
    verb: 'withdrawn',
    meaning: 'I withdraw this change; nothing of it has been entered.',
  },
  issue: {
    moves: { approved: 'issued' },
    roles: ['engineer', 'approver'],
    verb: 'issued',
    meaning: 'I issue this change as approved, to be entered at the machine.',
  },
  apply: {
    moves: { issued: 'applied' },
    roles: ['technician'],
    verb: 'applied',
    meaning:
      'I have entered these values at the machine named here and read them back; as-found and as-left are as I recorded them.',
  },
  verify: {
    moves: { applied: 'verified' },
    roles: ['engineer', 'technician'],
    verb: 'verified',
    meaning: 'I have run the test at the machine and recorded its result.',
  },
  'roll-back': {
    moves: { issued: 'rolled-back', applied: 'rolled-back', verified: 'rolled-back' },
    roles: ['technician'],
    verb: 'rolled back',
    meaning: 'I have put the earlier values back at the machine and read them back.',
  },
};

/** The meaning of the signature under a step, in words; null where nothing is signed. */
export function signatureMeaning(action: ChangeAction): string | null {
  return CHANGE_STEPS[action].meaning ?? null;
}
