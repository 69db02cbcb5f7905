import { ok, refuse, type Result } from '../../result';
import { recognisePlant, type PlantShape } from '../reduction/recognise';
import type { Plant } from '../types';
import { modelsOf, wordsFor } from './describe-model';
import type { ModelShape, Row, RuleDefinition, RuleModel, TuningType } from './types';

/** The model that the formula was evaluated with. */
export interface UsedModel {
  readonly shape: ModelShape;
  /** Its parameters by name: k, tau, tau1, theta, zeta, ..., ku, tu. */
  readonly parameters: Readonly<Record<string, number>>;
  /** How the model came from the plant, in words. */
  readonly method: string;
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
  if (onUltimate !== undefined && question.ultimate !== undefined) {
    return ok(picked(onUltimate, { shape: 'ultimate', ...question.ultimate }, 'given ultimate point'));
  }
  if (question.plant === undefined) {
    return refuse('PLANT_NEEDED', `${rule.name} needs a plant: an ultimate point alone does not suffice.`);
  }
  const shape = recognisePlant(question.plant);
  const exact = rows.find((row) => row.shape === shape.shape);
  if (exact !== undefined && shape.shape !== 'general') {
    const objection = exact.objection(shape);
    if (objection === null) return ok(picked(exact, shape, 'exact'));
    return refuse('PLANT_NOT_SERVED', `${rule.name}: ${objection}`);
  }
  return refuse(
    'PLANT_NOT_SERVED',
    `${rule.name} ${question.type} is written for ${modelsOf(rows)}; this is ${wordsFor(shape.shape)}.`,
  );
}

function picked(row: Row, model: RuleModel, method: string): PickedRow {
  const { shape, ...parameters } = model;
  return { row, model, used: { shape, parameters, method } };
}
