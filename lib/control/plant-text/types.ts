import type { Result } from '../../result';
import type { Plant } from '../types';

export type Notation = 'coefficients' | 'expression' | 'parameters' | 'gain-zeros-poles' | 'json';

export interface ParsedPlant {
  readonly plant: Plant;
  readonly notation: Notation;
  /** Sentences where the text could have been meant otherwise. */
  readonly warnings: readonly string[];
}

export type PlantTextCode =
  | 'EMPTY'
  | 'TOO_LONG'
  | 'SYNTAX'
  | 'UNKNOWN_SYMBOL'
  | 'UNBALANCED_BRACKET'
  | 'NOT_RATIONAL'
  | 'IMPROPER'
  | 'NEGATIVE_DEAD_TIME'
  | 'ORDER_TOO_HIGH'
  | 'NOT_FINITE'
  | 'ZERO_DENOMINATOR'
  | 'ZERO_PLANT'
  | 'AMBIGUOUS';

export type TextResult<T> = Result<T, PlantTextCode>;

/** Where the parts of a plant begin in the text, as far as it can be told. */
export interface PartPlaces {
  readonly num?: number;
  readonly den?: number;
  readonly deadTime?: number;
}

/** Coefficients as read, before they are judged as a plant. */
export interface RawPlant {
  readonly num: readonly number[];
  readonly den: readonly number[];
  readonly deadTimeS: number;
  readonly warnings?: readonly string[];
  readonly places?: PartPlaces;
}

export const HIGHEST_ORDER = 20;
