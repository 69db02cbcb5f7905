import { checkAnswer, verdictAnswer } from '@/lib/http/check-answer';
import { endpoint } from '@/lib/http/endpoint';
import { checkRequest } from '@/lib/schemas/calculation';
import { loadCasesOf } from '@/lib/schemas/loop';
import { checkLoadCases } from '@/lib/services/gain-sets/check-load-cases';

export const POST = endpoint({
  schema: checkRequest,
  run: async ({ input }) => {
    const { controller, requirement = {}, actuator, sampleTime, horizon, points } = input;
    const cases = loadCasesOf(input) ?? [];
    const settings = { actuator, sampleTimeS: sampleTime, horizonS: horizon, points };
    const { checks, worst, verdict } = checkLoadCases(cases, controller, requirement, settings);
    if (!input.loadCases) return { ...checkAnswer(checks[0].check), verdict: verdictAnswer(verdict) };
    return {
      stable: checks.every(({ check }) => check.stable),
      loadCases: checks.map(({ name, check }) => ({ name, ...checkAnswer(check) })),
      worst: worst.name,
      verdict: verdictAnswer(verdict),
    };
  },
});
