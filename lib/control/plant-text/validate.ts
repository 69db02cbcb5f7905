import { ok, refuse } from '../../result';
import { trimmed } from '../polynomial';
import { roots } from '../roots';
import type { Plant } from '../types';
import { HIGHEST_ORDER, type PartPlaces, type TextResult } from './types';

/** Sizes beyond these have no meaning for a plant in any unit, and would overflow on the way. */
const LARGEST = 1e40;
const SMALLEST = 1e-40;

/** Two roots closer than this, relative to their size, count as one. */
const SAME_ROOT = 1e-7;

/** Without leading zeros, and with 0 for −0. */
function tidy(p: readonly number[]): number[] {
  return trimmed(p).map((c) => (c === 0 ? 0 : c));
}

/**
 * Judges coefficients as a plant: finite, not zero, proper, order up to 20, dead time not negative.
 *
 * @param num, den descending powers of s
 * @param deadTimeS s
 * @param places where these begin in a text, for the refusals
 * @returns the plant without leading zeros, or what is wrong and what would be right
 */
export function validatePlant(
  num: readonly number[],
  den: readonly number[],
  deadTimeS: number,
  places: PartPlaces = {},
): TextResult<Plant> {
  if (num.length === 0 || den.length === 0)
    return refuse('EMPTY', 'Numerator and denominator need a coefficient each.');
  if (![...num, ...den, deadTimeS].every(Number.isFinite))
    return refuse('NOT_FINITE', 'A coefficient or the dead time is not a finite number.');
  const extreme = [...num, ...den, deadTimeS].find(
    (c) => c !== 0 && !(Math.abs(c) >= SMALLEST && Math.abs(c) <= LARGEST),
  );
  if (extreme !== undefined)
    return refuse(
      'NOT_FINITE',
      `${extreme} is beyond what can be computed with (${SMALLEST} to ${LARGEST}). Use another unit of time.`,
    );
  const top = tidy(num);
  const bottom = tidy(den);
  if (bottom.every((c) => c === 0))
    return refuse(
      'ZERO_DENOMINATOR',
      'The denominator is zero. It needs at least one coefficient other than 0.',
      places.den,
    );
  if (top.every((c) => c === 0))
    return refuse(
      'ZERO_PLANT',
      'The numerator is zero: such a plant does not answer at all. It needs a gain other than 0.',
      places.num,
    );
  if (top.length > bottom.length)
    return refuse(
      'IMPROPER',
      `Improper: the numerator has degree ${top.length - 1}, the denominator only ${bottom.length - 1}. A real plant has at least as many poles as zeros.`,
      places.num,
    );
  if (bottom.length - 1 > HIGHEST_ORDER)
    return refuse(
      'ORDER_TOO_HIGH',
      `The order is ${bottom.length - 1}; up to ${HIGHEST_ORDER} can be handled. Reduce the plant first.`,
      places.den,
    );
  if (deadTimeS < 0)
    return refuse(
      'NEGATIVE_DEAD_TIME',
      `The dead time is ${deadTimeS} s; it can't be negative. Write e^(-θ s) with θ ≥ 0.`,
      places.deadTime,
    );
  return ok({ num: top, den: bottom, deadTimeS: deadTimeS === 0 ? 0 : deadTimeS });
}

function rootWords(re: number, im: number): string {
  const real = Number(re.toPrecision(4));
  return im === 0 ? `${real}` : `${real} ± ${Number(Math.abs(im).toPrecision(4))}j`;
}

/** A sentence when numerator and denominator share a root: it is kept, but may not be meant. */
export function commonFactorWarning({ num, den }: Plant): string | null {
  if (num.length < 2) return null;
  const poles = roots(den);
  const shared = roots(num).find((zero) =>
    poles.some(
      (pole) => Math.hypot(zero.re - pole.re, zero.im - pole.im) <= SAME_ROOT * Math.hypot(zero.re, zero.im),
    ),
  );
  if (!shared) return null;
  return `Numerator and denominator have the root ${rootWords(shared.re, shared.im)} in common; it is not cancelled.`;
}
