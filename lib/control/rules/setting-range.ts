import type { SettingRange } from './types';

/** How much slower than the recommendation the calm end of the dial is. */
export const CALM_FACTOR = 4;

/**
 * Range of a closed-loop time in s: the calm end four times the recommendation, the sharp end `fastestS`, the
 * fastest that the source allows, or half of the recommendation where the source names no limit.
 */
export function closedLoopTime(
  recommendedS: number,
  fastestS: number | null = null,
  extras: Pick<SettingRange, 'least' | 'note'> = {},
): SettingRange {
  return {
    recommended: recommendedS,
    calm: CALM_FACTOR * recommendedS,
    sharp: fastestS ?? recommendedS / 2,
    ...extras,
  };
}

/**
 * Value of a setting at a position of the dial, on a log scale in each half.
 *
 * @param position 0 (calm) to 1 (sharp); to 0.5 when the range has no sharp end
 */
export function settingAt({ recommended, calm, sharp }: SettingRange, position: number): number {
  if (position === 0.5) return recommended;
  if (position < 0.5) return recommended * (calm / recommended) ** (1 - 2 * position);
  return recommended * ((sharp ?? recommended) / recommended) ** (2 * position - 1);
}

/** Position of a value on the dial; null outside its ends. */
export function positionOf({ recommended, calm, sharp }: SettingRange, value: number): number | null {
  if (value === recommended) return 0.5;
  const towardsCalm = Math.log(value / recommended) / Math.log(calm / recommended);
  if (towardsCalm > 0) return towardsCalm <= 1 ? (1 - towardsCalm) / 2 : null;
  if (sharp === null) return null;
  const towardsSharp = Math.log(value / recommended) / Math.log(sharp / recommended);
  return towardsSharp <= 1 ? (1 + towardsSharp) / 2 : null;
}
