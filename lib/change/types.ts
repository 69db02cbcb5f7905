/** Where a change stands; verified, rolled-back and withdrawn are its ends. A verified change can still be rolled back. */
export const CHANGE_STATES = [
  'draft',
  'submitted',
  'returned',
  'approved',
  'issued',
  'applied',
  'verified',
  'rolled-back',
  'withdrawn',
] as const;
export type ChangeState = (typeof CHANGE_STATES)[number];

export const CHANGE_ACTIONS = [
  'edit',
  'submit',
  'approve',
  'return',
  'withdraw',
  'issue',
  'apply',
  'verify',
  'roll-back',
] as const;
export type ChangeAction = (typeof CHANGE_ACTIONS)[number];

export const ROLES = ['engineer', 'approver', 'technician', 'admin'] as const;
export type Role = (typeof ROLES)[number];
