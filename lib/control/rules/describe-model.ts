import type { PlantShape } from '../reduction/recognise';
import type { ModelShape, Row } from './types';

const WORDS: Record<ModelShape, string> = {
  gain: 'a gain with dead time',
  'first-order': 'a first-order plant',
  'second-order-real': 'a plant of two lags',
  'second-order-complex': 'a damped second-order plant',
  'second-order-rhp-zero': 'a second-order plant with inverse response',
  'third-order-real': 'a plant of three lags',
  integrator: 'an integrator',
  'integrator-lag': 'an integrator with one lag',
  'integrator-two-lags': 'an integrator with two lags',
  'integrator-zero-lag': 'an integrator with a zero and a lag',
  'double-integrator': 'a double integrator',
  ultimate: 'an ultimate gain and period',
};

export function wordsFor(shape: PlantShape['shape'] | 'ultimate'): string {
  return shape === 'general' ? 'a plant of this order' : WORDS[shape];
}

/** 'a first-order plant or an integrator': the models that the rows are written for. */
export function modelsOf(rows: readonly Row[]): string {
  const words = [...new Set(rows.map((row) => WORDS[row.shape]))];
  const last = words.pop() ?? '';
  return words.length === 0 ? last : `${words.join(', ')} or ${last}`;
}
