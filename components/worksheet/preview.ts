import { describePlant, type PlantDescription } from '../../lib/control/describe';
import { bodeCurve, type BodeCurve } from '../../lib/control/frequency';
import { parsePlantText, type ParsedPlant } from '../../lib/control/plant-text';
import { dialMaximum, RULES, tune, type RuleId, type Tuning } from '../../lib/control/rules';
import { idealController, type ControllerType, type IdealController } from '../../lib/control/types';
import { judgeLoadCases, type LoadCaseVerdict, type Requirement } from '../../lib/requirement';
import type { Result } from '../../lib/result';
import { checkLoop } from '../../lib/sim/check';
import type { LoopCheck } from '../../lib/sim/types';

/** Terms of the controller that no rule sets: derivative filter, set-point weights, measurement filter. */
export type ControllerTerms = Partial<Pick<IdealController, 'n' | 'b' | 'c' | 'filter'>>;

export type GainChoice =
  | { kind: 'rule'; rule: RuleId; type: ControllerType; aggressiveness: number; variant?: string }
  | { kind: 'hand'; kp: number; ti: number; td: number };

export interface PreviewRequest {
  cases: readonly { name: string; text: string }[];
  /** Index of the load case whose plant the rule is applied to. */
  tuneOn: number;
  /** Index of the load case whose curves are drawn. */
  shown: number;
  gains: GainChoice;
  terms: ControllerTerms;
  requirement: Requirement;
  /** What runs in the machine now, drawn behind the proposal. */
  inService: { label: string; controller: IdealController } | null;
}

export interface PreviewCase {
  name: string;
  parsed: Result<ParsedPlant>;
  description: PlantDescription | null;
  check: LoopCheck | null;
}

export interface Preview {
  cases: PreviewCase[];
  /** Null when the gains are typed by hand. */
  tuning: Result<Tuning> | null;
  controller: IdealController | null;
  bode: BodeCurve | null;
  /** The shown load case under the gains in service. */
  before: LoopCheck | null;
  verdict: LoadCaseVerdict | null;
}

const CURVE_POINTS = 600;

function gainsFor(request: PreviewRequest, plants: (ParsedPlant | null)[]) {
  const { gains, terms } = request;
  if (gains.kind === 'hand') {
    const { kp, ti, td } = gains;
    return { tuning: null, controller: idealController({ ...terms, kp, ti, td }) };
  }
  const plant = plants[request.tuneOn]?.plant;
  if (!plant) return { tuning: null, controller: null };
  const { rule, type, variant } = gains;
  const facts = RULES.find(({ id }) => id === rule);
  const aggressiveness = Math.min(gains.aggressiveness, facts ? dialMaximum(facts) : 1);
  const tuning = tune({ plant, rule, type, aggressiveness, variant });
  return { tuning, controller: tuning.ok ? { ...tuning.value.controller, ...terms } : null };
}

/**
 * All that the worksheet shows for one state of its fields: the plants read, the gains worked out, every load
 * case checked with the fast engine, and the verdict. Pure: the worker runs it on every move of the dial.
 */
export function preview(request: PreviewRequest): Preview {
  const parsed = request.cases.map(({ text }) => parsePlantText(text));
  const plants = parsed.map((result) => (result.ok ? result.value : null));
  const { tuning, controller } = gainsFor(request, plants);
  const cases = request.cases.map(({ name }, index): PreviewCase => {
    const plant = plants[index]?.plant;
    return {
      name,
      parsed: parsed[index],
      description: plant ? describePlant(plant) : null,
      check: plant && controller ? checkLoop(plant, controller, { points: CURVE_POINTS }) : null,
    };
  });
  const shownPlant = plants[request.shown]?.plant;
  const shownCheck = cases[request.shown]?.check;
  const checked = cases.flatMap(({ name, check }) => (check ? [{ name, check }] : []));
  return {
    cases,
    tuning,
    controller,
    bode: shownPlant && controller ? bodeCurve(shownPlant, controller) : null,
    before:
      shownPlant && request.inService && shownCheck
        ? checkLoop(shownPlant, request.inService.controller, {
            points: CURVE_POINTS,
            horizonS: shownCheck.setpoint?.horizonS,
          })
        : null,
    verdict:
      checked.length === request.cases.length && checked.length > 0
        ? judgeLoadCases(request.requirement, checked)
        : null,
  };
}
