import type { NativeSettings } from './native';
import type { ModelOf, ModelShape, Row, RuleDefinition, RuleModel, SettingRange, TuningType } from './types';

interface RowParts<Shape extends ModelShape> {
  readonly variant?: string;
  readonly objection?: (model: ModelOf<Shape>) => string | null;
  readonly range?: (model: ModelOf<Shape>, dampingRatio: number) => SettingRange | string | null;
  readonly settings: (
    model: ModelOf<Shape>,
    setting: number,
    dampingRatio: number,
  ) => NativeSettings | string;
  readonly warnings?: (model: ModelOf<Shape>, setting: number) => readonly string[];
}

/** Gives a rule its literal id, so that the registry knows the set of ids. */
export function defineRule<const Id extends string>(rule: RuleDefinition<Id>): RuleDefinition<Id> {
  return rule;
}

/** A row of a rule's table; see `Row`. Throws TypeError when it is asked about a model of another shape. */
export function row<Shape extends ModelShape>(shape: Shape, type: TuningType, parts: RowParts<Shape>): Row {
  const own = (model: RuleModel): ModelOf<Shape> => {
    if (hasShape(model, shape)) return model;
    throw new TypeError(`row for ${shape} asked about ${model.shape}`);
  };
  return {
    shape,
    type,
    variant: parts.variant ?? null,
    objection: (model) => parts.objection?.(own(model)) ?? null,
    range: (model, dampingRatio) => parts.range?.(own(model), dampingRatio) ?? null,
    settings: (model, setting, dampingRatio) => parts.settings(own(model), setting, dampingRatio),
    warnings: (model, setting) => parts.warnings?.(own(model), setting) ?? [],
  };
}

function hasShape<Shape extends ModelShape>(model: RuleModel, shape: Shape): model is ModelOf<Shape> {
  return model.shape === shape;
}

/** Objection of rows that divide by the dead time. */
export function needsDeadTime({ theta }: { readonly theta: number }): string | null {
  return theta > 0
    ? null
    : 'The formula divides by the dead time, and this plant has none: it needs a dead time greater than 0.';
}

/** Objection of rows that are published for plants without dead time. */
export function needsNoDeadTime({ theta }: { readonly theta: number }): string | null {
  return theta === 0 ? null : 'This row is published for plants without dead time only.';
}

/** Row for gain, lag and dead time (FOPDT), which needs a dead time. */
export function stepTestRow(
  type: TuningType,
  settings: (k: number, tau: number, theta: number) => NativeSettings,
  variant?: string,
): Row {
  return row('first-order', type, {
    ...(variant === undefined ? {} : { variant }),
    objection: needsDeadTime,
    settings: ({ k, tau, theta }) => settings(k, tau, theta),
  });
}

/** Row for an integrator with dead time (IPDT), which needs a dead time. */
export function integratorRow(type: TuningType, settings: (k: number, theta: number) => NativeSettings): Row {
  return row('integrator', type, {
    objection: needsDeadTime,
    settings: ({ k, theta }) => settings(k, theta),
  });
}
