import type { Plant } from '../types';

/**
 * A plant as a text that reads back to exactly the same plant: `[2420] / [1 118.8 1936], delay 3`.
 *
 * @param plant a plant as `parsePlantText` or `validatePlant` returns it
 */
export function plantToText({ num, den, deadTimeS }: Plant): string {
  const lists = `[${num.join(' ')}] / [${den.join(' ')}]`;
  return deadTimeS > 0 ? `${lists}, delay ${deadTimeS}` : lists;
}
