import { ok, refuse, type Result } from '../result';
import { CHANGE_STEPS } from './steps';
import { CHANGE_ACTIONS, type ChangeAction, type ChangeState, type Role } from './types';

export type StepRefusal = 'WRONG_STATE' | 'WRONG_ROLE' | 'FOUR_EYES';

export interface StepQuestion {
  readonly state: ChangeState;
  readonly action: ChangeAction;
  /** The roles of the person who asks. */
  readonly roles: readonly Role[];
  /** Whether that person is the author of the change. */
  readonly isAuthor: boolean;
  /** The organisation has given up the four eyes, and its records say so. */
  readonly onePersonShop: boolean;
  /** Outcome of the test, for verify. Default: pass. */
  readonly result?: 'pass' | 'fail';
}

export interface PermittedStep {
  readonly to: ChangeState;
  /** What has to follow; a failed test leaves the change applied and asks for the roll-back. */
  readonly advice?: string;
}

/**
 * Whether a person may take a step with a change, and where it leads. The role is judged first, then the state, then
 * the four eyes.
 *
 * @returns the next state; WRONG_ROLE (also for steps that only the author may take), WRONG_STATE or FOUR_EYES with a
 *   sentence that says what would be right
 */
export function permittedStep(question: StepQuestion): Result<PermittedStep, StepRefusal> {
  const { state, action, roles, isAuthor, onePersonShop, result = 'pass' } = question;
  const step = CHANGE_STEPS[action];
  if (!step.roles.some((role) => roles.includes(role))) {
    return refuse(
      'WRONG_ROLE',
      `A change is ${step.verb} by ${people(step.roles)}; you are ${yourRoles(roles)}.`,
    );
  }
  if (step.author === 'required' && !isAuthor) {
    return refuse('WRONG_ROLE', `A change can only be ${step.verb} by the engineer who drafted it.`);
  }
  const to = step.moves[state];
  if (to === undefined) return refuse('WRONG_STATE', wrongState(state, action));
  if (step.author === 'barred' && isAuthor && !onePersonShop) {
    return refuse('FOUR_EYES', 'You drafted this change; somebody else has to decide on it (four eyes).');
  }
  if (action === 'verify' && result === 'fail') {
    return ok({
      to: state,
      advice: 'The test failed. The change stays applied; roll it back to the as-found values.',
    });
  }
  return ok({ to });
}

/** The actions that the person may take now, in the order of the table. */
export function permittedActions(question: Omit<StepQuestion, 'action'>): ChangeAction[] {
  return CHANGE_ACTIONS.filter((action) => permittedStep({ ...question, action }).ok);
}

const STATE_WORDS: Readonly<Record<ChangeState, string>> = {
  draft: 'still a draft',
  submitted: 'submitted and waits for approval',
  returned: 'returned to its author',
  approved: 'already approved',
  issued: 'already issued',
  applied: 'already applied at the machine',
  verified: 'already verified',
  'rolled-back': 'rolled back',
  withdrawn: 'withdrawn',
};

function wrongState(state: ChangeState, action: ChangeAction): string {
  const { moves, verb } = CHANGE_STEPS[action];
  const from = list(Object.keys(moves).map((name) => (name === 'draft' ? 'a draft' : name)));
  return `This change is ${STATE_WORDS[state]}; it can be ${verb} only while it is ${from}.`;
}

function people(roles: readonly Role[]): string {
  return list(roles.map(withArticle));
}

function yourRoles(roles: readonly Role[]): string {
  return roles.length === 0 ? 'without a role here' : roles.map(withArticle).join(' and ');
}

function withArticle(role: Role): string {
  return role === 'technician' ? 'a technician' : `an ${role}`;
}

function list(words: readonly string[]): string {
  return words.length < 2 ? words.join('') : `${words.slice(0, -1).join(', ')} or ${words[words.length - 1]}`;
}
