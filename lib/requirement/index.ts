export { REQUIREMENT_ITEMS, type RequirementItem } from './items';
export { judge } from './judge';
export { judgeLoadCases, type LoadCaseCheck, type LoadCaseVerdict } from './load-cases';
export type { Requirement, RequirementKey, RequirementUnit, Verdict, VerdictItem } from './types';
