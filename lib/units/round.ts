/** Digits beyond which a double carries only crumbs of binary arithmetic (0.1·3 = 0.30000000000000004). */
const CLEAN_DIGITS = 15;

/**
 * Rounds to a number of significant digits: 0.0012345 to 3 is 0.00123.
 *
 * @param value any number; infinities and NaN come back as they are
 * @param significant digits, whole, 1 to 17
 */
export function roundSignificant(value: number, significant: number): number {
  if (!Number.isInteger(significant) || significant < 1 || significant > 17) {
    throw new RangeError(`significant must be a whole number from 1 to 17, not ${significant}`);
  }
  return Number.isFinite(value) ? Number(value.toPrecision(significant)) : value;
}

/**
 * Rounds to the nearest multiple of a step; halves go away from zero, so that both signs are treated alike.
 * The result is the decimal number that a display with this step shows, free of binary crumbs.
 *
 * @param value any number; infinities and NaN come back as they are
 * @param step finite and > 0
 */
export function roundToStep(value: number, step: number): number {
  if (!(step > 0) || !Number.isFinite(step)) throw new RangeError(`step must be above 0, not ${step}`);
  if (!Number.isFinite(value)) return value;
  const steps = Math.round(roundSignificant(Math.abs(value) / step, CLEAN_DIGITS));
  const rounded = roundSignificant(steps * step, CLEAN_DIGITS);
  return rounded === 0 ? 0 : Math.sign(value) * rounded;
}

/** Decimals that a display needs to show multiples of a step: 0.05 needs 2, 5 needs none. */
export function decimalsOfStep(step: number): number {
  if (!(step > 0) || !Number.isFinite(step)) throw new RangeError(`step must be above 0, not ${step}`);
  const [mantissa, exponent = '0'] = String(step).split('e');
  const fraction = mantissa.split('.')[1] ?? '';
  return Math.max(0, fraction.length - Number(exponent));
}
