export { canonicalText } from './canonical-text';
export { CAUTIONS, type Caution } from './cautions';
export { diffValues, type ValueDifference } from './diff';
export {
  permittedActions,
  permittedStep,
  type PermittedStep,
  type StepQuestion,
  type StepRefusal,
} from './permitted-step';
export { CHANGE_STEPS, signatureMeaning, type ChangeStep } from './steps';
export {
  CHANGE_ACTIONS,
  CHANGE_STATES,
  ROLES,
  type ChangeAction,
  type ChangeState,
  type Role,
} from './types';
