import { ok, refuse, type Result } from '../../result';
import { plantFactors } from '../reduction/factors';
import { recognisePlant } from '../reduction/recognise';
import type { Plant } from '../types';
import { ultimatePoint } from '../ultimate';
import { modelsOf, wordsFor } from './describe-model';
import { reducedModels } from './reduced-model';
import type { ModelShape, Row, RuleDefinition, RuleModel, TuningType } from './types';

/** The model that the formula was evaluated with. */
export interface UsedModel {
  readonly shape: ModelShape;
  /** Its parameters by name: k, tau, tau1, theta, zeta, ..., ku, tu. */
  readonly parameters: Readonly<Record<string, number>>;
  /** How the model came from the plant, in words; 'exact' when the plant has this shape. */
  readonly method: string;
  /** Largest difference of the unit step responses of model and plant relative to the final value, if known. */
  readonly error?: number;
}

export interface PickedRow {
  readonly row: Row;
  readonly model: RuleModel;
  readonly used: UsedModel;
}

export type PickCode = 'PLANT_NEEDED' | 'PLANT_NOT_SERVED';

interface Question {
  readonly plant?: Plant;
  readonly ultimate?: { readonly ku: number; readonly tu: number };
  readonly type: TuningType;
  readonly variant?: string;
  /** Closed-loop time that the reduction of a numerator takes into account, in s. */
  readonly tauCS?: number;
}

/**
 * Chooses the row of a rule: the exact shape of the plant first, a reduced model where the rule has no row for it.
 * Rules on the ultimate point take a given one, else that of the plant.
 */
export function pickRow(rule: RuleDefinition, question: Question): Result<PickedRow, PickCode> {
  const rows = rule.rows.filter(
    (row) => row.type === question.type && row.variant === (question.variant ?? null),
  );
  const onUltimate = rows.find((row) => row.shape === 'ultimate');
  if (onUltimate !== undefined) return onUltimatePoint(rule, onUltimate, question);
  if (question.plant === undefined) {
    return refuse('PLANT_NEEDED', `${rule.name} needs a plant: an ultimate point alone does not suffice.`);
  }
  const shape = recognisePlant(question.plant);
  const model = shape.shape === 'general' ? null : shape;
  const exact = model === null ? null : rowFor(rows, model);
  if (model !== null && exact !== null && typeof exact !== 'string') return ok(picked(exact, model, 'exact'));
  const attempts =
    rule.exactOnly === true ? [] : reducedModels(question.plant, shape.shape, rows, question.tauCS);
  const refusals = typeof exact === 'string' ? [exact] : [];
  for (const attempt of attempts) {
    if ('refusal' in attempt) {
      refusals.push(attempt.refusal);
      continue;
    }
    const row = rowFor(rows, attempt.model);
    if (row !== null && typeof row !== 'string') {
      return ok(picked(row, attempt.model, attempt.reduction.method, attempt.reduction.error));
    }
    if (row !== null) refusals.push(row);
  }
  const reason =
    refusals[0] ??
    `${question.type} settings are written for ${modelsOf(rows)}, and this is ${wordsFor(shape.shape)}.`;
  return refuse('PLANT_NOT_SERVED', `${rule.name}: ${reason}`);
}

function onUltimatePoint(
  rule: RuleDefinition,
  row: Row,
  { plant, ultimate }: Question,
): Result<PickedRow, PickCode> {
  if (ultimate !== undefined) {
    const { ku, tu } = ultimate;
    return ok(picked(row, { shape: 'ultimate', ku, tu }, 'given ultimate point'));
  }
  if (plant === undefined) {
    return refuse('PLANT_NEEDED', `${rule.name} needs a plant, or its ultimate gain and period.`);
  }
  const { unstable, zeroStaticGain } = plantFactors(plant);
  if (unstable || zeroStaticGain) {
    const what = unstable ? 'is unstable or undamped' : 'has a zero at the origin';
    return refuse(
      'PLANT_NOT_SERVED',
      `${rule.name}: the plant ${what}, and the rule is for stable and integrating plants.`,
    );
  }
  const point = ultimatePoint(plant);
  if (!point.ok) return refuse('PLANT_NOT_SERVED', `${rule.name}: ${point.message}`);
  const { ku, tu } = point.value;
  return ok(picked(row, { shape: 'ultimate', ku, tu }, 'exact ultimate point of the plant'));
}

/** The row for a model; its objection when it does not hold there; null when there is none. */
function rowFor(rows: readonly Row[], model: RuleModel): Row | string | null {
  const row = rows.find(({ shape }) => shape === model.shape);
  return row === undefined ? null : (row.objection(model) ?? row);
}

function picked(row: Row, model: RuleModel, method: string, error?: number): PickedRow {
  const { shape, ...parameters } = model;
  return { row, model, used: { shape, parameters, method, ...(error === undefined ? {} : { error }) } };
}
